import { integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import { parts } from './parts'
import { people, suppliers } from './people'

/** Control limits frozen from a base period, per supplier × part × characteristic; the newest one counts. */
export const driftBases = sqliteTable('drift_bases', {
  id: integer('id').primaryKey(),
  supplierId: integer('supplier_id').notNull().references(() => suppliers.id),
  partId: integer('part_id').notNull().references(() => parts.id),
  key: text('key').notNull(),
  version: integer('version').notNull(),
  fromDate: text('from_date').notNull(),
  toDate: text('to_date').notNull(),
  reason: text('reason').notNull(),
  frozenById: integer('frozen_by_id').notNull().references(() => people.id),
  frozenAt: text('frozen_at').notNull(),
}, table => [uniqueIndex('drift_bases_version').on(table.supplierId, table.partId, table.key, table.version)])
