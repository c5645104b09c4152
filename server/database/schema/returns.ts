import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core'
import type { Disposition } from '#shared/compute/lifecycle/lot'
import type { NonconformanceState } from '#shared/compute/lifecycle/nonconformance'
import { lots } from './lots'
import { papers } from './papers'
import { people, suppliers } from './people'

/** What is open with a supplier about a rejected lot. */
export const nonconformances = sqliteTable('nonconformances', {
  id: integer('id').primaryKey(),
  number: text('number').notNull().unique(),
  lotId: integer('lot_id').notNull().unique().references(() => lots.id),
  supplierId: integer('supplier_id').notNull().references(() => suppliers.id),
  state: text('state').$type<NonconformanceState>().notNull(),
  openedAt: text('opened_at').notNull(),
  answerDueOn: text('answer_due_on').notNull(),
  acknowledgedAt: text('acknowledged_at'),
  acknowledgedById: integer('acknowledged_by_id').references(() => people.id),
  disposition: text('disposition').$type<Disposition>(),
  dispositionReason: text('disposition_reason'),
  dispositionById: integer('disposition_by_id').references(() => people.id),
  dispositionAt: text('disposition_at'),
  closedAt: text('closed_at'),
}, table => [index('nonconformances_by_supplier').on(table.supplierId, table.state)])

/** Messages both ways about a nonconformance, and what happened to it. */
export const nonconformanceEntries = sqliteTable('nonconformance_entries', {
  id: integer('id').primaryKey(),
  nonconformanceId: integer('nonconformance_id').notNull().references(() => nonconformances.id),
  kind: text('kind').notNull(),
  text: text('text').notNull(),
  byId: integer('by_id').references(() => people.id),
  at: text('at').notNull(),
}, table => [index('nonconformance_entries_by_parent').on(table.nonconformanceId, table.at)])

/** Mail to be sent, written in the transaction that causes it. */
export const notices = sqliteTable('notices', {
  id: integer('id').primaryKey(),
  /** Stable over retries. */
  messageId: text('message_id').notNull().unique(),
  kind: text('kind').notNull(),
  nonconformanceId: integer('nonconformance_id').references(() => nonconformances.id),
  lotId: integer('lot_id').references(() => lots.id),
  recipientId: integer('recipient_id').references(() => people.id),
  recipientAddress: text('recipient_address').notNull(),
  subject: text('subject').notNull(),
  text: text('text').notNull(),
  html: text('html').notNull(),
  /** Sent only when this paper's PDF is stored; attached then. */
  paperId: integer('paper_id').references(() => papers.id),
  state: text('state').$type<'queued' | 'sent' | 'given-up'>().notNull(),
  attempts: integer('attempts').notNull().default(0),
  nextAttemptAt: text('next_attempt_at').notNull(),
  lastError: text('last_error'),
  sentAt: text('sent_at'),
  createdAt: text('created_at').notNull(),
}, table => [index('notices_by_state').on(table.state, table.nextAttemptAt)])
