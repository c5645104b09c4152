import { z } from 'zod'
import type { PaperRecord } from './paper-record'
import type { PaperState } from '../compute/lifecycle/paper'

export const paperListSchema = z.object({
  text: z.string().trim().max(100).default(''),
  kind: z.enum(['', 'acceptance', 'rejection']).catch(''),
  state: z.enum(['', 'issued', 'superseded', 'withdrawn']).catch(''),
  sort: z.enum(['number', 'supplier', 'supplierLot', 'kind', 'state', 'issuedAt']).catch('issuedAt'),
  order: z.enum(['rising', 'falling']).catch('falling'),
  page: z.coerce.number().int().min(1).catch(1),
})
export const paperParamsSchema = z.object({ number: z.string().max(40) })
export const tokenParamsSchema = z.object({ token: z.string().regex(/^[0-9a-f]{32}$/, 'Not a certificate’s address.') })
export const tokenFileParamsSchema = tokenParamsSchema.extend({ sha256: z.string().regex(/^[0-9a-f]{64}$/) })
export const withdrawPaperSchema = z.object({ password: z.string().min(1, 'Type your password to sign.').max(500), reason: z.string().trim().min(3, 'Give the reason in a few words.').max(1000) })

export interface PaperRow {
  number: string
  kind: 'acceptance' | 'rejection'
  state: PaperState
  lotNumber: string
  supplierLot: string
  supplier: string
  partNumber: string
  issuedAt: string
  pdfReady: boolean
  checkLink: string
}
export interface PaperListAnswer { rows: PaperRow[]; total: number; pageSize: number }

/** What anyone with the link sees: this lot's data only. */
export interface CheckAnswer {
  state: PaperState
  endedAt: string | null
  endedReason: string | null
  record: PaperRecord
  /** The record as signed, byte for byte. */
  recordText: string
  recordSha256: string
  signature: string
  keyId: string
  publicKeyPem: string
  pdfSha256: string | null
  /** Digests of the logbook's entries about this paper. */
  logbook: { sequence: number; at: string; action: string; contentHash: string; previousHash: string; entryHash: string }[]
}
export interface PaperPage extends CheckAnswer { checkLink: string; pdfReady: boolean }
