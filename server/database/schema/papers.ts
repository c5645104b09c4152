import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core'
import type { PaperState } from '#shared/compute/lifecycle/paper'
import { decisions, lots } from './lots'
import { people } from './people'

/** Counters from which numbers without gaps are taken, inside the transaction that uses them. */
export const counters = sqliteTable('counters', {
  name: text('name').primaryKey(),
  value: integer('value').notNull(),
})

/** Public halves of the keys that sign records; the private ones are in the data folder. */
export const signingKeys = sqliteTable('signing_keys', {
  id: text('id').primaryKey(),
  publicKeyPem: text('public_key_pem').notNull(),
  createdAt: text('created_at').notNull(),
  retiredAt: text('retired_at'),
})

/** Certificates. The record is the certificate; the PDF is drawn from it, once. */
export const papers = sqliteTable('papers', {
  id: integer('id').primaryKey(),
  number: text('number').notNull().unique(),
  kind: text('kind').$type<'acceptance' | 'rejection'>().notNull(),
  lotId: integer('lot_id').notNull().references(() => lots.id),
  decisionId: integer('decision_id').notNull().references(() => decisions.id),
  /** 128 random bits, hexadecimal: the address of the public check page. */
  token: text('token').notNull().unique(),
  /** Canonical JSON (RFC 8785). */
  record: text('record').notNull(),
  recordSha256: text('record_sha256').notNull(),
  /** Ed25519 over the record's bytes, base64. */
  signature: text('signature').notNull(),
  keyId: text('key_id').notNull().references(() => signingKeys.id),
  state: text('state').$type<PaperState>().notNull(),
  issuedById: integer('issued_by_id').notNull().references(() => people.id),
  issuedAt: text('issued_at').notNull(),
  pdfSha256: text('pdf_sha256'),
  pdfDrawnAt: text('pdf_drawn_at'),
  endedAt: text('ended_at'),
  endedById: integer('ended_by_id').references(() => people.id),
  endedReason: text('ended_reason'),
}, table => [index('papers_by_lot').on(table.lotId), index('papers_by_issue').on(table.issuedAt)])
