import { desc } from 'drizzle-orm'
import canonicalize from 'canonicalize'
import { logbook } from '../../database/schema/logbook'
import type { Transaction } from '../../database/client'
import { sha256Hex } from '../../files/store'
import { now, randomHex } from '../context'
import type { Services } from '../context'

/** What happened. `content` holds ids, numbers and figures only: no names and no free text about people. */
export interface LogbookEvent {
  actorId: number | null
  /** `lot.received`, `paper.issued`, … */
  action: string
  subjectKind: 'lot' | 'measurement' | 'upload' | 'sheet' | 'part' | 'rig' | 'paper' | 'nonconformance' | 'notice' | 'person' | 'session' | 'supplier' | 'drift' | 'system'
  subjectId: string | number
  content?: Record<string, unknown>
}

/**
 * Adds an entry to the logbook, inside the transaction of what it tells about: either both stand or neither.
 *
 * entryHash = SHA-256(previousHash ‖ contentHash), contentHash = SHA-256(salt ‖ canonical JSON of everything else); lower-case hexadecimal strings are joined as text.
 *
 * @returns the entry's sequence number and hash.
 */
export function appendToLogbook(services: Pick<Services, 'clock' | 'randomBytes'>, tx: Transaction, event: LogbookEvent): { sequence: number; entryHash: string } {
  const last = tx.select({ sequence: logbook.sequence, entryHash: logbook.entryHash }).from(logbook).orderBy(desc(logbook.sequence)).limit(1).get()
  const sequence = (last?.sequence ?? 0) + 1
  const previousHash = last?.entryHash ?? ''
  const at = now(services)
  const salt = randomHex(services, 16)
  const content = canonicalJson(event.content ?? {})
  const subjectId = String(event.subjectId)
  const contentHash = hashLogbookContent({ sequence, at, actorId: event.actorId, action: event.action, subjectKind: event.subjectKind, subjectId, content, salt })
  const entryHash = sha256Hex(previousHash + contentHash)
  tx.insert(logbook).values({
    sequence, at, actorId: event.actorId, action: event.action, subjectKind: event.subjectKind, subjectId, content, salt, contentHash, previousHash, entryHash,
  }).run()
  return { sequence, entryHash }
}

/** Hash of what an entry says, salted so that the digest alone tells nothing. */
export function hashLogbookContent(entry: { sequence: number; at: string; actorId: number | null; action: string; subjectKind: string; subjectId: string; content: string; salt: string }): string {
  const { sequence, at, actorId, action, subjectKind, subjectId, content, salt } = entry
  return sha256Hex(salt + canonicalJson({ sequence, at, actorId, action, subjectKind, subjectId, content }))
}

function canonicalJson(value: Record<string, unknown>): string {
  const text = canonicalize(value)
  if (text === undefined) throw new RangeError('canonicalJson: value must be a JSON object')
  return text
}
