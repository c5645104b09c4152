import { index, integer, primaryKey, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core'
import type { MotorVerdict, Verdict } from '#shared/compute/terms/judgement'
import type { CharacteristicUnit, ColumnRecipe, Fault, MapResult, Method } from '#shared/compute/terms/measurement'
import { lots, samples } from './lots'
import { limitSheets } from './parts'
import { people } from './people'
import { calibrations, rigs } from './rigs'

/** Files as they came, by the hash of their content; never overwritten. */
export const rawFiles = sqliteTable('raw_files', {
  sha256: text('sha256').primaryKey(),
  size: integer('size').notNull(),
  storedAt: text('stored_at').notNull(),
})

/** Every file that was handed in, whatever became of it. */
export const uploads = sqliteTable('uploads', {
  id: integer('id').primaryKey(),
  lotId: integer('lot_id').notNull().references(() => lots.id),
  sampleId: integer('sample_id').references(() => samples.id),
  name: text('name').notNull(),
  sha256: text('sha256').notNull().references(() => rawFiles.sha256),
  rigId: integer('rig_id').notNull().references(() => rigs.id),
  /** judged: has a measurement; incomplete: waits for the other direction; refused: see fault; tray: fits no motor; discarded: taken out of the tray. */
  state: text('state').$type<'judged' | 'incomplete' | 'refused' | 'tray' | 'discarded'>().notNull(),
  fault: text('fault', { mode: 'json' }).$type<Fault>(),
  /** The columns as guessed, when the file waits for a unit to be named. */
  recipe: text('recipe', { mode: 'json' }).$type<ColumnRecipe>(),
  measurementId: integer('measurement_id').references(() => measurements.id),
  uploadedById: integer('uploaded_by_id').notNull().references(() => people.id),
  uploadedAt: text('uploaded_at').notNull(),
}, table => [
  index('uploads_by_lot').on(table.lotId, table.state),
  index('uploads_by_sample').on(table.sampleId),
  index('uploads_by_file').on(table.sha256),
])

/** One judged attempt at one motor; figures never change afterwards. */
export const measurements = sqliteTable('measurements', {
  id: integer('id').primaryKey(),
  lotId: integer('lot_id').notNull().references(() => lots.id),
  sampleId: integer('sample_id').notNull().references(() => samples.id),
  attempt: integer('attempt').notNull(),
  method: text('method').$type<Method>().notNull(),
  rigId: integer('rig_id').notNull().references(() => rigs.id),
  calibrationId: integer('calibration_id').notNull().references(() => calibrations.id),
  sheetId: integer('sheet_id').notNull().references(() => limitSheets.id),
  engineVersion: text('engine_version').notNull(),
  result: text('result', { mode: 'json' }).$type<MapResult>().notNull(),
  verdict: text('verdict').$type<Verdict>(),
  judgement: text('judgement', { mode: 'json' }).$type<MotorVerdict>().notNull(),
  /** Why the motor was measured again; '' for the first attempt. */
  reason: text('reason').notNull().default(''),
  measuredById: integer('measured_by_id').notNull().references(() => people.id),
  measuredAt: text('measured_at').notNull(),
  voidedAt: text('voided_at'),
  voidedById: integer('voided_by_id').references(() => people.id),
  voidReason: text('void_reason'),
}, table => [
  uniqueIndex('measurements_attempt').on(table.sampleId, table.attempt),
  index('measurements_by_lot').on(table.lotId),
])

/** The files that a measurement was computed from, in order. */
export const measurementFiles = sqliteTable('measurement_files', {
  measurementId: integer('measurement_id').notNull().references(() => measurements.id),
  ordinal: integer('ordinal').notNull(),
  sha256: text('sha256').notNull().references(() => rawFiles.sha256),
  name: text('name').notNull(),
}, table => [
  primaryKey({ columns: [table.measurementId, table.ordinal] }),
  index('measurement_files_by_file').on(table.sha256),
])

/** Figures by key, for trends. */
export const measurementValues = sqliteTable('measurement_values', {
  measurementId: integer('measurement_id').notNull().references(() => measurements.id),
  key: text('key').notNull(),
  value: real('value').notNull(),
  expandedUncertainty: real('expanded_uncertainty'),
  unit: text('unit').$type<CharacteristicUnit>().notNull(),
}, table => [primaryKey({ columns: [table.measurementId, table.key] })])
