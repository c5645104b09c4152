import { randomBytes } from 'node:crypto'
import { rmSync } from 'node:fs'
import { join } from 'node:path'
import analysisCode from '../workers/analysis.ts?thread-code'
import { openDatabase } from '../database/client'
import { seedDemo } from '../database/seed/seed-demo'
import { durableDriver } from '../files/durable-driver'
import { createFileStore } from '../files/store'
import { startDemoMailServer } from '../mail/demo-server'
import { createMailTransport } from '../mail/transport'
import { loadOrCreateSigner } from '../papers/keys'
import { sendNotices } from '../services/notices/send-notices'
import { drawPapers } from '../services/papers/draw-papers'
import { startAnalysisPool } from '../workers/pool'
import type { Services } from '../services/context'
import { keptSecret, lockDataFolder } from './data-folder'
import { loadFonts } from './fonts'
import { createJobs } from './jobs'
import { unpackMigrations } from './migrations-folder'
import { setDemoMailbox } from './demo-mailbox'

export interface RunningServer {
  services: Services
  close: () => Promise<void>
}

/**
 * Starts everything behind the routes: data folder and lock, database, file store, signing key, analysis threads, mail, background jobs, and in a demo the
 * mail server and the seed.
 *
 * @throws Error with a sentence for the administrator when a setting cannot work.
 */
export async function startServer(): Promise<RunningServer> {
  const settings = useRuntimeConfig()
  const folder = settings.dataFolder
  checkOrigin(settings.public.origin)
  const unlock = lockDataFolder(folder)
  // nuxt-auth-utils reads the secret from the environment with every request.
  process.env.NUXT_SESSION_PASSWORD ||= keptSecret(folder, 'session-secret')
  const migrations = await unpackMigrations()
  const db = openDatabase(join(folder, 'evenlot.sqlite'), migrations)
  rmSync(migrations, { recursive: true, force: true })
  const storage = useStorage()
  storage.mount('files', durableDriver({ base: join(folder, 'files') }))
  const pool = startAnalysisPool(analysisCode)
  const demoMail = settings.demo && settings.mail.host === '' ? await startDemoMailServer(join(folder, 'demo-mail')) : null
  setDemoMailbox(demoMail)
  const transport = createMailTransport(demoMail ? { ...settings.mail, host: '127.0.0.1', port: demoMail.port, secure: false } : settings.mail)
  const fonts = await loadFonts()

  const jobs = createJobs({
    papers: () => drawPapers(services, fonts),
    outbox: () => sendNotices(services, transport),
  })
  const services: Services = {
    db,
    files: createFileStore(useStorage('files')),
    signer: loadOrCreateSigner(folder),
    clock: () => new Date(),
    randomBytes: length => new Uint8Array(randomBytes(length)),
    analyse: pool.analyse,
    passwords: { hash: password => hashPassword(password), verify: (hash, password) => verifyPassword(hash, password) },
    wake: name => jobs.wake(name),
    settings: {
      origin: settings.public.origin, plantName: settings.plantName, plantTimeZone: settings.plantTimeZone, mailSender: settings.mail.sender, demo: settings.demo,
    },
  }
  if (settings.demo) await seedDemo(services, settings.demoSize === 'small' ? 'small' : 'full')
  services.wake('papers')
  services.wake('outbox')
  return {
    services,
    async close() {
      await jobs.settled()
      await pool.close()
      await demoMail?.close()
      db.$client.close()
      unlock()
    },
  }
}

/** Links in QR codes and mail start with the origin; secure cookies and the browser's cryptography need https or this machine. */
function checkOrigin(origin: string): void {
  const url = URL.canParse(origin) ? new URL(origin) : null
  const local = url !== null && ['localhost', '127.0.0.1', '[::1]'].includes(url.hostname)
  if (!url || (url.protocol !== 'https:' && !local)) {
    throw new Error(`NUXT_PUBLIC_ORIGIN is "${origin}". Set it to the https address under which people reach Evenlot; only this machine itself may do without https.`)
  }
}
