import { build } from 'esbuild'
import type { Plugin } from 'rollup'

const SUFFIX = '?thread-code'

/**
 * Rollup and Vite plugin: `import code from './x.ts?thread-code'` gives the bundled source of `x.ts` as a string, to be run by
 * `new Worker(code, { eval: true })`. Works the same in development, in the build and under vitest, where a worker's own file would have three
 * different addresses.
 */
export function threadCode(): Plugin {
  return {
    name: 'evenlot:thread-code',
    async resolveId(source, importer) {
      if (!source.endsWith(SUFFIX)) return null
      const resolved = await this.resolve(source.slice(0, -SUFFIX.length), importer, { skipSelf: true })
      return resolved ? resolved.id + SUFFIX : null
    },
    async load(id) {
      if (!id.endsWith(SUFFIX)) return null
      const entry = id.slice(0, -SUFFIX.length)
      const result = await build({
        entryPoints: [entry],
        bundle: true,
        write: false,
        platform: 'node',
        format: 'cjs',
        target: 'node20',
        minify: true,
        metafile: true,
        alias: { '#shared': new URL('../../shared', import.meta.url).pathname },
      })
      for (const input of Object.keys(result.metafile.inputs)) this.addWatchFile(input)
      return `export default ${JSON.stringify(result.outputFiles[0]!.text)}`
    },
  }
}
