import { index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core'
import type { ColumnRecipe, Method, RigProperties } from '#shared/compute/terms/measurement'
import { people } from './people'

/** Measuring equipment. */
export const rigs = sqliteTable('rigs', {
  id: integer('id').primaryKey(),
  code: text('code').notNull().unique(),
  name: text('name').notNull(),
  method: text('method').$type<Method>().notNull(),
  location: text('location').notNull().default(''),
  properties: text('properties', { mode: 'json' }).$type<RigProperties>().notNull(),
  /** Columns of this rig's files, confirmed once; null until then. */
  recipe: text('recipe', { mode: 'json' }).$type<ColumnRecipe>(),
  recipeConfirmedById: integer('recipe_confirmed_by_id').references(() => people.id),
  recipeConfirmedAt: text('recipe_confirmed_at'),
  createdAt: text('created_at').notNull(),
})

/** One calibration of a rig; the latest one counts. */
export const calibrations = sqliteTable('calibrations', {
  id: integer('id').primaryKey(),
  rigId: integer('rig_id').notNull().references(() => rigs.id),
  certificateNumber: text('certificate_number').notNull(),
  laboratory: text('laboratory').notNull(),
  performedOn: text('performed_on').notNull(),
  dueOn: text('due_on').notNull(),
  torqueRelativeUncertainty: real('torque_relative_uncertainty').notNull(),
  torqueAbsoluteUncertaintyNm: real('torque_absolute_uncertainty_nm').notNull(),
  remarks: text('remarks').notNull().default(''),
  enteredById: integer('entered_by_id').notNull().references(() => people.id),
  enteredAt: text('entered_at').notNull(),
}, table => [index('calibrations_by_rig').on(table.rigId, table.performedOn)])
