import { existsSync, readdirSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'

const SERVER = fileURLToPath(new URL('../../../server', import.meta.url))

/** The routes that the server is built from, by method and path, as Nitro names them from their files. */
export function routeFiles(): { key: string; file: string }[] {
  const files = [...filesBelow(join(SERVER, 'api')), ...filesBelow(join(SERVER, 'routes'))].filter(file => file.endsWith('.ts'))
  return files.map(file => ({ key: keyOf(file), file })).sort((a, b) => a.key.localeCompare(b.key))
}

function filesBelow(folder: string): string[] {
  if (!existsSync(folder)) return []
  return readdirSync(folder, { withFileTypes: true, recursive: true }).filter(entry => entry.isFile()).map(entry => join(entry.parentPath, entry.name))
}

function keyOf(file: string): string {
  const path = relative(SERVER, file).replace(/^routes\//, '').replace(/\.ts$/, '')
  const method = /\.(get|post|put|patch|delete)$/.exec(path)?.[1] ?? 'get'
  const address = path.replace(/\.(get|post|put|patch|delete)$/, '').replace(/(^|\/)index$/, '').replaceAll(/\[([^\]]+)\]/g, ':$1')
  return `${method.toUpperCase()} /${address}`
}
