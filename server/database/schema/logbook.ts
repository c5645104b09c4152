import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core'

/** Append-only and chained: entryHash = SHA-256(previousHash ‖ SHA-256(salt ‖ content)). Triggers refuse change and removal. */
export const logbook = sqliteTable('logbook', {
  /** 1, 2, 3 … without gaps. */
  sequence: integer('sequence').primaryKey(),
  at: text('at').notNull(),
  actorId: integer('actor_id'),
  action: text('action').notNull(),
  subjectKind: text('subject_kind').notNull(),
  subjectId: text('subject_id').notNull(),
  /** JSON of ids and figures; no names, no free personal text. */
  content: text('content').notNull(),
  salt: text('salt').notNull(),
  contentHash: text('content_hash').notNull(),
  previousHash: text('previous_hash').notNull(),
  entryHash: text('entry_hash').notNull(),
}, table => [
  index('logbook_by_subject').on(table.subjectKind, table.subjectId),
  index('logbook_by_action').on(table.action, table.at),
])
