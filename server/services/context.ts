import type { AnalysisOutcome, AnalysisSettings } from '#shared/compute/terms/measurement'
import type { Role } from '#shared/compute/terms/people'
import type { EvenlotDatabase } from '../database/client'
import type { FileStore } from '../files/store'
import type { RecordSigner } from '../papers/keys'

/** The person on whose behalf a service runs. */
export interface Actor {
  personId: number
  name: string
  role: Role
  /** Set for suppliers' contacts only. */
  supplierId: number | null
}

/** What services use instead of globals; tests and the demo seed give their own clock and random source. */
export interface Services {
  db: EvenlotDatabase
  files: FileStore
  signer: RecordSigner
  /** Current time. */
  clock: () => Date
  /** Cryptographic random bytes (a seeded stand-in in the demo seed). */
  randomBytes: (length: number) => Uint8Array
  /** Runs the engine, off the event loop in the server. */
  analyse: (files: { name: string; bytes: Uint8Array }[], settings: AnalysisSettings) => Promise<AnalysisOutcome>
  passwords: { hash: (password: string) => Promise<string>; verify: (hash: string, password: string) => Promise<boolean> }
  /** Wakes a background job after a commit. */
  wake: (job: 'papers' | 'outbox') => void
  settings: ServiceSettings
}

export interface ServiceSettings {
  /** Address under which people reach the application; links in QR codes and mail start with it. */
  origin: string
  plantName: string
  plantTimeZone: string
  mailSender: string
  demo: boolean
}

/** Services with the person who asks. */
export interface Context extends Services {
  actor: Actor
}

/** Time as stored: UTC, ISO 8601. */
export function now(context: Pick<Services, 'clock'>): string {
  return context.clock().toISOString()
}

/** Random bytes as lower-case hexadecimal digits. */
export function randomHex(context: Pick<Services, 'randomBytes'>, bytes: number): string {
  return Buffer.from(context.randomBytes(bytes)).toString('hex')
}
