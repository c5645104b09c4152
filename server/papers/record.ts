import canonicalize from 'canonicalize'
import { paperRecordSchema } from '#shared/contracts/paper-record'
import type { PaperRecord } from '#shared/contracts/paper-record'
import { sha256Hex } from '../files/store'

/**
 * A record as canonical JSON (RFC 8785) with its SHA-256 in hexadecimal.
 *
 * @throws ZodError when the record does not fit its schema.
 */
export function canonicalRecord(record: PaperRecord): { text: string; sha256: string } {
  // A round trip through JSON drops what is undefined; typed arrays and dates would be taken silently otherwise.
  const text = canonicalize(JSON.parse(JSON.stringify(paperRecordSchema.parse(record))))
  if (text === undefined) throw new RangeError('canonicalRecord: record must be a JSON object')
  return { text, sha256: sha256Hex(text) }
}

/** The record that a stored text holds. */
export function parseRecord(text: string): PaperRecord {
  return paperRecordSchema.parse(JSON.parse(text))
}
