import { asc, gt } from 'drizzle-orm'
import type { LogbookCheck } from '#shared/contracts/logbook'
import type { Reader } from '../../database/client'
import { logbook } from '../../database/schema/logbook'
import { sha256Hex } from '../../files/store'
import { hashLogbookContent } from './append'

const BATCH = 2_000

/** Walks the whole chain: numbers without gaps, each entry's content hash, each link to the entry before. */
export function checkLogbook(db: Pick<Reader, 'select'>): LogbookCheck {
  let previousHash = ''
  let sequence = 0
  for (;;) {
    const batch = db.select().from(logbook).where(gt(logbook.sequence, sequence)).orderBy(asc(logbook.sequence)).limit(BATCH).all()
    if (batch.length === 0) return { ok: true, entries: sequence, headHash: previousHash, problem: null }
    for (const entry of batch) {
      const sentence = faultOf(entry, sequence + 1, previousHash)
      if (sentence) return { ok: false, entries: sequence, headHash: previousHash, problem: { sequence: entry.sequence, sentence } }
      previousHash = entry.entryHash
      sequence = entry.sequence
    }
  }
}

function faultOf(entry: typeof logbook.$inferSelect, expected: number, previousHash: string): string | null {
  if (entry.sequence !== expected) return `Entry ${expected} is missing.`
  if (entry.previousHash !== previousHash) return `Entry ${entry.sequence} does not continue entry ${expected - 1}: one of them was changed.`
  if (hashLogbookContent(entry) !== entry.contentHash) return `Entry ${entry.sequence} no longer says what was written.`
  if (sha256Hex(previousHash + entry.contentHash) !== entry.entryHash) return `The hash of entry ${entry.sequence} does not follow from its content.`
  return null
}
