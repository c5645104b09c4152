import { index, integer, primaryKey, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import type { AnySQLiteColumn } from 'drizzle-orm/sqlite-core'
import type { LotVerdict, SamplingPlan, Severity } from '#shared/compute/terms/judgement'
import type { LotState } from '#shared/compute/lifecycle/lot'
import { people, suppliers } from './people'
import { limitSheets, parts } from './parts'

/** Received batches. */
export const lots = sqliteTable('lots', {
  id: integer('id').primaryKey(),
  /** Our receipt number, `26-0083`; the address of the lot's page. */
  number: text('number').notNull().unique(),
  supplierId: integer('supplier_id').notNull().references(() => suppliers.id),
  partId: integer('part_id').notNull().references(() => parts.id),
  /** The supplier's lot number, as on the label. */
  supplierLot: text('supplier_lot').notNull(),
  quantity: integer('quantity').notNull(),
  orderNumber: text('order_number').notNull().default(''),
  unitPrice: real('unit_price'),
  remarks: text('remarks').notNull().default(''),
  state: text('state').$type<LotState>().notNull(),
  sheetId: integer('sheet_id').notNull().references(() => limitSheets.id),
  severity: text('severity').$type<Severity>().notNull(),
  /** Why this severity, one sentence. */
  severityReason: text('severity_reason').notNull(),
  plan: text('plan', { mode: 'json' }).$type<SamplingPlan>().notNull(),
  /** Hexadecimal seed of the draw, and the generator's name: anyone can repeat it. */
  drawSeed: text('draw_seed').notNull(),
  drawGenerator: text('draw_generator').notNull(),
  resubmissionOfId: integer('resubmission_of_id').references((): AnySQLiteColumn => lots.id),
  receivedById: integer('received_by_id').notNull().references(() => people.id),
  receivedAt: text('received_at').notNull(),
  decidedAt: text('decided_at'),
}, table => [
  uniqueIndex('lots_by_supplier_lot').on(table.supplierId, table.partId, table.supplierLot),
  index('lots_by_state').on(table.state, table.receivedAt),
  index('lots_by_part').on(table.partId, table.supplierId, table.receivedAt),
])

/** Serial numbers of a lot by position, when the delivery lists them. */
export const lotSerials = sqliteTable('lot_serials', {
  lotId: integer('lot_id').notNull().references(() => lots.id),
  position: integer('position').notNull(),
  serial: text('serial').notNull(),
}, table => [
  primaryKey({ columns: [table.lotId, table.position] }),
  uniqueIndex('lot_serials_serial').on(table.lotId, table.serial),
])

/** Motors drawn, in the order of the draw. */
export const samples = sqliteTable('samples', {
  id: integer('id').primaryKey(),
  lotId: integer('lot_id').notNull().references(() => lots.id),
  drawOrder: integer('draw_order').notNull(),
  position: integer('position').notNull(),
  /** null until the inspector binds a serial to the position. */
  serial: text('serial'),
  boundById: integer('bound_by_id').references(() => people.id),
  boundAt: text('bound_at'),
}, table => [
  uniqueIndex('samples_order').on(table.lotId, table.drawOrder),
  uniqueIndex('samples_position').on(table.lotId, table.position),
  uniqueIndex('samples_serial').on(table.lotId, table.serial),
  index('samples_by_serial').on(table.serial),
])

/** The signed decision of a lot. */
export const decisions = sqliteTable('decisions', {
  id: integer('id').primaryKey(),
  lotId: integer('lot_id').notNull().unique().references(() => lots.id),
  outcome: text('outcome').$type<'accepted' | 'rejected'>().notNull(),
  /** Rejected by a person against a computed acceptance; never the other way. */
  overruled: integer('overruled', { mode: 'boolean' }).notNull(),
  reason: text('reason').notNull().default(''),
  lotVerdict: text('lot_verdict', { mode: 'json' }).$type<LotVerdict>().notNull(),
  /** SHA-256 of the evidence that the signer was shown. */
  evidenceHash: text('evidence_hash').notNull(),
  signedById: integer('signed_by_id').notNull().references(() => people.id),
  signedAt: text('signed_at').notNull(),
})

/** Engineer's interventions in the switching of severities. */
export const switchingActions = sqliteTable('switching_actions', {
  id: integer('id').primaryKey(),
  supplierId: integer('supplier_id').notNull().references(() => suppliers.id),
  partId: integer('part_id').notNull().references(() => parts.id),
  kind: text('kind').$type<'reduced-agreed' | 'normal-restored' | 'reopened'>().notNull(),
  reason: text('reason').notNull(),
  byId: integer('by_id').notNull().references(() => people.id),
  at: text('at').notNull(),
}, table => [index('switching_actions_by_part').on(table.supplierId, table.partId, table.at)])
