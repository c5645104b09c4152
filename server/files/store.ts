import { createHash } from 'node:crypto'
import type { Storage } from 'unstorage'
import { DomainError } from '../services/domain-error'

/** Files by the SHA-256 of their content. */
export interface FileStore {
  /** Stores the bytes, if they are not there yet, and answers their SHA-256 (lower-case hexadecimal). Durable when it returns. */
  put: (bytes: Uint8Array) => Promise<string>
  /** The bytes of that hash, checked against it; throws DomainError when missing or altered on the disk. */
  get: (sha256: string) => Promise<Uint8Array>
}

export const sha256Hex = (bytes: Uint8Array | string): string => createHash('sha256').update(bytes).digest('hex')

/** Key of a file in the storage: two levels, so that no folder grows large. */
const keyOf = (sha256: string): string => `${sha256.slice(0, 2)}:${sha256}`

/** A file store on a storage of Nitro's storage layer (the file system by default). */
export function createFileStore(storage: Storage): FileStore {
  return {
    async put(bytes) {
      const hash = sha256Hex(bytes)
      if (!(await storage.hasItem(keyOf(hash)))) await storage.setItemRaw(keyOf(hash), Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength))
      return hash
    },
    async get(sha256) {
      const stored: Uint8Array | string | null = await storage.getItemRaw(keyOf(sha256))
      if (stored === null || stored === undefined) throw new DomainError('not-found', `The file ${sha256.slice(0, 12)}… is not in the store. Tell the administrator: it belongs to a record.`)
      const bytes = typeof stored === 'string' ? Buffer.from(stored) : stored
      if (sha256Hex(bytes) !== sha256) throw new DomainError('refused', `The file ${sha256.slice(0, 12)}… was altered on the disk: its content no longer has the hash it was stored under. Tell the administrator.`)
      return bytes
    },
  }
}
