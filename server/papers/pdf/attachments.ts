import { AFRelationship } from 'pdf-lib'
import type { PDFDocument } from 'pdf-lib'

export interface RawFile { name: string; sha256: string; bytes: Uint8Array }

const RECORD_NAME = 'record.json'

/** Names that are each used once: a repeated one gets the first digits of its hash before its ending. */
export function distinctNames(files: readonly Pick<RawFile, 'name' | 'sha256'>[]): string[] {
  const counts = new Map<string, number>([[RECORD_NAME, 1]])
  for (const file of files) counts.set(file.name, (counts.get(file.name) ?? 0) + 1)
  return files.map(file => counts.get(file.name) === 1 ? file.name : file.name.replace(/(\.[^.]*)?$/, ending => `-${file.sha256.slice(0, 12)}${ending}`))
}

/**
 * Attaches the record and the raw files, sorted by name as a PDF's name tree has to be.
 *
 * Source: ISO 32000-1, 7.9.6 (name trees) and 7.11.4 (embedded files).
 */
export async function attachFiles(document: PDFDocument, recordText: string, rawFiles: readonly RawFile[], at: Date): Promise<void> {
  const names = distinctNames(rawFiles)
  const all = [
    { name: RECORD_NAME, bytes: new TextEncoder().encode(recordText), mimeType: 'application/json', description: 'The certificate’s record, canonical JSON (RFC 8785)', afRelationship: AFRelationship.Data },
    ...rawFiles.map((file, index) => ({ name: names[index]!, bytes: file.bytes, mimeType: 'text/csv', description: `Raw file ${file.name}, SHA-256 ${file.sha256}`, afRelationship: AFRelationship.Source })),
  ].sort((a, b) => a.name < b.name ? -1 : 1)
  for (const { name, bytes, ...about } of all) await document.attach(bytes, name, { ...about, creationDate: at, modificationDate: at })
}
