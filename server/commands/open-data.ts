import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import Database from 'better-sqlite3'
import { drizzle } from 'drizzle-orm/better-sqlite3'
import { createStorage } from 'unstorage'
import { durableDriver } from '../files/durable-driver'
import { createFileStore } from '../files/store'

/**
 * Opens a data folder for reading only: the one named by --data, else NUXT_DATA_FOLDER, else the demo's.
 *
 * Ends the process with a sentence when there is none.
 */
export function openData(options: Record<string, { type: 'string' }> = {}) {
  const values: Record<string, string | undefined> = parseArgs({ options: { data: { type: 'string' }, ...options } }).values
  const folder = values.data ?? process.env.NUXT_DATA_FOLDER ?? '.data/demo'
  const path = join(folder, 'evenlot.sqlite')
  if (!existsSync(path)) {
    console.error(`There is no database in ${folder}. Name the data folder with --data FOLDER.`)
    process.exit(1)
  }
  const sqlite = new Database(path, { readonly: true })
  return { db: drizzle(sqlite), files: createFileStore(createStorage({ driver: durableDriver({ base: join(folder, 'files') }) })), values, close: () => sqlite.close() }
}
