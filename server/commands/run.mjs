import { build } from 'esbuild'
import { mkdirSync } from 'node:fs'
import { fileURLToPath, pathToFileURL } from 'node:url'

/** Bundles a command of this folder and runs it: node server/commands/run.mjs NAME [arguments]. */
const root = fileURLToPath(new URL('../..', import.meta.url))
const name = process.argv[2] ?? ''
if (!/^[a-z-]+$/.test(name)) {
  console.error('Name a command: node server/commands/run.mjs check-logbook')
  process.exit(1)
}
const folder = `${root}node_modules/.cache/evenlot`
mkdirSync(folder, { recursive: true })
const outfile = `${folder}/${name}.mjs`
await build({
  entryPoints: [`${root}server/commands/${name}.ts`], outfile, bundle: true, platform: 'node', format: 'esm', target: 'node20', packages: 'external', alias: { '#shared': `${root}shared` }, logLevel: 'error',
})
process.argv.splice(1, 2, outfile)
await import(pathToFileURL(outfile).href)
