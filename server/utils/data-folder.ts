import { randomBytes } from 'node:crypto'
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import Database from 'better-sqlite3'

/**
 * Makes the data folder and takes its lock: one process a folder. The lock is an exclusive transaction on a file of its own, which the operating system lets go
 * when the process ends, however it ends.
 *
 * @returns a function that gives the lock back.
 * @throws Error when another process holds it.
 */
export function lockDataFolder(folder: string): () => void {
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const lock = new Database(join(folder, 'lock.sqlite'), { timeout: 0 })
  try {
    lock.pragma('locking_mode = EXCLUSIVE')
    lock.exec('BEGIN EXCLUSIVE')
  }
  catch {
    lock.close()
    throw new Error(`Another Evenlot process works on the data folder ${folder}. Stop it first, or give this one a folder of its own (NUXT_DATA_FOLDER).`)
  }
  return () => lock.close()
}

/** A secret kept in the data folder, made at first use: 32 random bytes in hexadecimal, readable by the owner only. */
export function keptSecret(folder: string, name: string): string {
  const path = join(folder, name)
  if (!existsSync(path)) {
    writeFileSync(path, randomBytes(32).toString('hex'), { mode: 0o600, flag: 'wx' })
    chmodSync(path, 0o600)
  }
  return readFileSync(path, 'utf8').trim()
}
