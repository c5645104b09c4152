import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core'
import type { Role } from '#shared/compute/terms/people'

/** Companies that deliver motors. */
export const suppliers = sqliteTable('suppliers', {
  id: integer('id').primaryKey(),
  /** The supplier's identifier on labels (data identifier V). */
  code: text('code').notNull().unique(),
  name: text('name').notNull().unique(),
  address: text('address').notNull().default(''),
  language: text('language').notNull().default('en'),
  createdAt: text('created_at').notNull(),
})

/** Everyone who signs in, suppliers' contacts included. */
export const people = sqliteTable('people', {
  id: integer('id').primaryKey(),
  name: text('name').notNull(),
  /** Sign-in name and address for notices, lower case. */
  email: text('email').notNull().unique(),
  role: text('role').$type<Role>().notNull(),
  /** Set for the role supplier only. */
  supplierId: integer('supplier_id').references(() => suppliers.id),
  /** 1: first contact for notices, 2: second, null: none. */
  noticeRank: integer('notice_rank'),
  passwordHash: text('password_hash').notNull(),
  passwordVersion: integer('password_version').notNull().default(1),
  disabledAt: text('disabled_at'),
  createdAt: text('created_at').notNull(),
}, table => [index('people_by_supplier').on(table.supplierId)])

/** One row a sign-in; the cookie names it and every request checks it. */
export const sessions = sqliteTable('sessions', {
  id: text('id').primaryKey(),
  personId: integer('person_id').notNull().references(() => people.id),
  passwordVersion: integer('password_version').notNull(),
  createdAt: text('created_at').notNull(),
  seenAt: text('seen_at').notNull(),
  endedAt: text('ended_at'),
}, table => [index('sessions_by_person').on(table.personId)])

/** Failed sign-ins in a row, per account and per address, to slow guessing. */
export const signInFailures = sqliteTable('sign_in_failures', {
  key: text('key').primaryKey(),
  count: integer('count').notNull(),
  lastAt: text('last_at').notNull(),
})
