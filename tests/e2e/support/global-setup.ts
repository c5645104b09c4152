import { spawn } from 'node:child_process'
import type { ChildProcess } from 'node:child_process'
import { existsSync, mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import type { TestProject } from 'vitest/node'

const BUILT = fileURLToPath(new URL('../../../.output/server/index.mjs', import.meta.url))

declare module 'vitest' {
  interface ProvidedContext {
    origin: string
  }
}

/** Starts the built server once, as a demo on a data folder of its own with the small seed, on a free port; server in UTC. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  if (!existsSync(BUILT)) throw new Error('There is no build. Run "npm run build" first.')
  const port = await freePort()
  const origin = `http://localhost:${port}`
  const folder = mkdtempSync(join(tmpdir(), 'evenlot-e2e-'))
  const server = spawn(process.execPath, [BUILT], {
    env: {
      ...process.env, TZ: 'UTC', PORT: String(port), HOST: '127.0.0.1', NUXT_PUBLIC_ORIGIN: origin, NUXT_DATA_FOLDER: folder,
      NUXT_DEMO: 'true', NUXT_PUBLIC_DEMO: 'true', NUXT_DEMO_SIZE: 'small',
    },
    stdio: ['ignore', 'inherit', 'inherit'],
  })
  await answers(`${origin}/api/session`, server)
  project.provide('origin', origin)
  return async () => {
    server.kill('SIGTERM')
    await new Promise(resolve => server.exitCode === null ? server.once('exit', resolve) : resolve(null))
    rmSync(folder, { recursive: true, force: true })
  }
}

async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer().listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() => typeof address === 'object' && address ? resolve(address.port) : reject(new Error('no port')))
    })
  })
}

async function answers(url: string, server: ChildProcess): Promise<void> {
  const deadline = Date.now() + 120_000
  while (Date.now() < deadline) {
    if (server.exitCode !== null) throw new Error(`The server stopped with exit code ${server.exitCode} while starting.`)
    try {
      if ((await fetch(url)).ok) return
    }
    catch {
      // not listening yet
    }
    await new Promise(resolve => setTimeout(resolve, 200))
  }
  throw new Error('The server did not answer within two minutes.')
}
