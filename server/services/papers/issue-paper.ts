import { desc } from 'drizzle-orm'
import { plantYear, takeNumber } from '../../database/counters'
import type { Transaction } from '../../database/client'
import { logbook } from '../../database/schema/logbook'
import { papers, signingKeys } from '../../database/schema/papers'
import { canonicalRecord } from '../../papers/record'
import { now, randomHex } from '../context'
import type { Services } from '../context'
import { appendToLogbook } from '../logbook/append'
import { assembleRecord } from './assemble-record'

/**
 * Issues the certificate of a decided lot inside the decision's transaction: number without gaps, record, hash, Ed25519 signature and the token of its check page. The
 * PDF is drawn afterwards, from the record alone.
 *
 * @returns number such as `P-2026-000318`, and the 128-bit token.
 */
export function issuePaper(services: Services, tx: Transaction, input: { actorId: number; lotId: number; decisionId: number; kind: 'acceptance' | 'rejection' }): { id: number; number: string; token: string } {
  const { settings, signer } = services
  const issuedAt = now(services)
  const year = plantYear(services.clock(), settings.plantTimeZone)
  const number = `P-${year}-${String(takeNumber(tx, `paper:${year}`)).padStart(6, '0')}`
  const token = randomHex(services, 16)
  const head = tx.select({ sequence: logbook.sequence, entryHash: logbook.entryHash }).from(logbook).orderBy(desc(logbook.sequence)).limit(1).get() ?? { sequence: 0, entryHash: '' }
  const { text, sha256 } = canonicalRecord({
    schema: 'evenlot.paper/1', number, kind: input.kind, issuedAt, timeZone: settings.plantTimeZone, buyer: settings.plantName, ...assembleRecord(tx, input.lotId), logbook: head, checkAddress: `${settings.origin}/check/${token}`,
  })
  tx.insert(signingKeys).values({ id: signer.keyId, publicKeyPem: signer.publicKeyPem, createdAt: issuedAt }).onConflictDoNothing().run()
  const paper = tx.insert(papers).values({
    number, kind: input.kind, lotId: input.lotId, decisionId: input.decisionId, token, record: text, recordSha256: sha256, signature: signer.sign(Buffer.from(text)), keyId: signer.keyId,
    state: 'issued', issuedById: input.actorId, issuedAt,
  }).returning().get()
  appendToLogbook(services, tx, { actorId: input.actorId, action: 'paper.issued', subjectKind: 'paper', subjectId: number, content: { recordSha256: sha256, keyId: signer.keyId } })
  return { id: paper.id, number, token }
}
