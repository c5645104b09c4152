import { mkdtempSync, mkdirSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'

/** Writes the migrations that the build carries to a temporary folder, where the migrator can read them. */
export async function unpackMigrations(): Promise<string> {
  const storage = useStorage('assets:migrations')
  const folder = mkdtempSync(join(tmpdir(), 'evenlot-migrations-'))
  for (const key of await storage.getKeys()) {
    const target = join(folder, key.replaceAll(':', '/'))
    mkdirSync(dirname(target), { recursive: true })
    const item: unknown = await storage.getItemRaw(key)
    writeFileSync(target, typeof item === 'string' || item instanceof Uint8Array ? item : JSON.stringify(item))
  }
  return folder
}
