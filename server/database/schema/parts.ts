import { index, integer, primaryKey, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import type { LimitSheetContent } from '#shared/compute/terms/judgement'
import type { LimitSheetState } from '#shared/compute/lifecycle/limit-sheet'
import type { MotorDesign } from '#shared/compute/terms/motor'
import { people, suppliers } from './people'

/** Motors that are bought, by the buyer's part number. */
export const parts = sqliteTable('parts', {
  id: integer('id').primaryKey(),
  number: text('number').notNull().unique(),
  name: text('name').notNull(),
  revision: text('revision').notNull().default(''),
  design: text('design', { mode: 'json' }).$type<MotorDesign>().notNull(),
  ratedTorqueNm: real('rated_torque_nm'),
  torqueConstantNmPerA: real('torque_constant_nm_per_a'),
  phaseResistanceOhm: real('phase_resistance_ohm'),
  rotorInertiaKgM2: real('rotor_inertia_kg_m2'),
  createdAt: text('created_at').notNull(),
})

/** Who delivers which part, under which of their own numbers and at which usual price. */
export const partSuppliers = sqliteTable('part_suppliers', {
  partId: integer('part_id').notNull().references(() => parts.id),
  supplierId: integer('supplier_id').notNull().references(() => suppliers.id),
  supplierPartNumber: text('supplier_part_number').notNull().default(''),
  unitPrice: real('unit_price'),
}, table => [primaryKey({ columns: [table.partId, table.supplierId] })])

/** Numbered versions of a part's limits; approved ones never change. */
export const limitSheets = sqliteTable('limit_sheets', {
  id: integer('id').primaryKey(),
  partId: integer('part_id').notNull().references(() => parts.id),
  version: integer('version').notNull(),
  state: text('state').$type<LimitSheetState>().notNull(),
  content: text('content', { mode: 'json' }).$type<LimitSheetContent>().notNull(),
  /** What changed and why, in the author's words. */
  reason: text('reason').notNull().default(''),
  authorId: integer('author_id').notNull().references(() => people.id),
  createdAt: text('created_at').notNull(),
  submittedAt: text('submitted_at'),
  approvedById: integer('approved_by_id').references(() => people.id),
  approvedAt: text('approved_at'),
  approvalReason: text('approval_reason'),
  effectiveFrom: text('effective_from'),
  retiredAt: text('retired_at'),
}, table => [
  uniqueIndex('limit_sheets_version').on(table.partId, table.version),
  index('limit_sheets_by_part').on(table.partId, table.state),
])
