import { randomBytes, scryptSync, timingSafeEqual } from 'node:crypto'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { createStorage } from 'unstorage'
import { onTestFinished } from 'vitest'
import { analyse } from '#shared/compute/torque/analyse'
import type { LimitSheetContent } from '#shared/compute/terms/judgement'
import type { MotorDesign } from '#shared/compute/terms/motor'
import type { Role } from '#shared/compute/terms/people'
import { openDatabase } from '../../../server/database/client'
import { limitSheets, parts, partSuppliers } from '../../../server/database/schema/parts'
import { people, suppliers } from '../../../server/database/schema/people'
import { calibrations, rigs } from '../../../server/database/schema/rigs'
import { durableDriver } from '../../../server/files/durable-driver'
import { createFileStore } from '../../../server/files/store'
import { loadOrCreateSigner } from '../../../server/papers/keys'
import type { Actor, Context, Services } from '../../../server/services/context'

export const MIGRATIONS = fileURLToPath(new URL('../../../server/database/migrations', import.meta.url))

/** Passwords of test people; hashing is real but cheap. */
export const PASSWORD = 'a password for tests'
const hashCheaply = (password: string) => scryptSync(password, 'test', 32, { N: 2 }).toString('hex')

/** Services on a real migrated database and a real folder, removed after the test; the clock can be set. */
export function openTestServices(start = '2026-12-01T08:00:00.000Z') {
  const folder = mkdtempSync(join(tmpdir(), 'evenlot-test-'))
  const db = openDatabase(join(folder, 'evenlot.sqlite'), MIGRATIONS)
  const storage = createStorage({ driver: durableDriver({ base: join(folder, 'files') }) })
  let time = new Date(start)
  const woken: string[] = []
  const services: Services = {
    db,
    files: createFileStore(storage),
    signer: loadOrCreateSigner(folder),
    clock: () => time,
    randomBytes: length => new Uint8Array(randomBytes(length)),
    analyse: async (files, settings) => analyse(files, settings),
    passwords: {
      hash: async password => hashCheaply(password),
      verify: async (hash, password) => timingSafeEqual(Buffer.from(hash, 'hex'), Buffer.from(hashCheaply(password), 'hex')),
    },
    wake: job => void woken.push(job),
    settings: { origin: 'http://localhost:3000', plantName: 'Kestrel Fold Robotics', plantTimeZone: 'Europe/Berlin', mailSender: 'incoming@kestrelfold.example', demo: false },
  }
  onTestFinished(() => {
    db.$client.close()
    rmSync(folder, { recursive: true, force: true })
  })
  return { services, folder, woken, setTime: (iso: string) => void (time = new Date(iso)) }
}

/** A person of that role, as services see one who signed in. */
export function addPerson(services: Services, role: Role, details: { name?: string; email?: string; supplierId?: number; noticeRank?: number } = {}): Actor {
  const name = details.name ?? `Test ${role}`
  const row = services.db.insert(people).values({
    name, email: details.email ?? `${role}.${randomBytes(3).toString('hex')}@kestrelfold.example`, role, supplierId: details.supplierId ?? null, noticeRank: details.noticeRank ?? null,
    passwordHash: hashCheaply(PASSWORD), createdAt: services.clock().toISOString(),
  }).returning().get()
  return { personId: row.id, name, role, supplierId: row.supplierId }
}

export const as = (services: Services, actor: Actor): Context => ({ ...services, actor })

export const OUTRUNNER: MotorDesign = { kind: 'brushless', slots: 12, poles: 14 }

export const SHEET: LimitSheetContent = {
  rippleDefinition: 'peakToPeakOverRated',
  highestOrder: null,
  limits: [
    { key: 'cogging.peakToPeak', lower: null, upper: 5.4e-3, unit: 'N·m', class: 'major' },
    { key: 'rippleRatio', lower: null, upper: 5.4, unit: '%', class: 'major' },
    { key: 'friction.mean', lower: null, upper: 2.5e-3, unit: 'N·m', class: 'minor' },
    { key: 'order.12', lower: null, upper: 0.6e-3, unit: 'N·m', class: 'major' },
  ],
  decisionRule: { kind: 'simple' },
  sampling: { kind: 'attributes', level: 'II', aql: { major: '2.5', minor: '4.0' } },
  requires: { bothDirections: true, temperature: false },
  compensation: { entries: 1024, stepNm: 0.1e-3 },
}

/** A plant with one supplier, one part with an approved sheet, one calibrated rig, and an engineer, an inspector and a supplier's contact. */
export function addPlant(services: Services) {
  const { db } = services
  const at = services.clock().toISOString()
  const supplier = db.insert(suppliers).values({ code: 'TUVALO', name: 'Tuvalo Precision Drives', createdAt: at }).returning().get()
  const engineer = addPerson(services, 'engineer', { name: 'Mara Quill', email: 'engineer@kestrelfold.example' })
  const secondEngineer = addPerson(services, 'engineer', { name: 'Jon Ferrant', email: 'engineer2@kestrelfold.example' })
  const inspector = addPerson(services, 'inspector', { name: 'Ines Falkenrath', email: 'inspector@kestrelfold.example' })
  const contact = addPerson(services, 'supplier', { name: 'Pell Ottomar', email: 'quality@tuvalo.example', supplierId: supplier.id, noticeRank: 1 })
  const part = db.insert(parts).values({ number: 'KF-4412-C', name: 'Wrist outrunner 12/14', revision: 'C', design: OUTRUNNER, ratedTorqueNm: 0.1, createdAt: at }).returning().get()
  db.insert(partSuppliers).values({ partId: part.id, supplierId: supplier.id, supplierPartNumber: 'TV-OR-1214', unitPrice: 18.4 }).run()
  const sheet = db.insert(limitSheets).values({
    partId: part.id, version: 1, state: 'approved', content: SHEET, reason: 'first limits', authorId: engineer.personId, createdAt: at, submittedAt: at,
    approvedById: secondEngineer.personId, approvedAt: at, approvalReason: 'agreed', effectiveFrom: '2025-01-01T00:00:00.000Z',
  }).returning().get()
  const rig = db.insert(rigs).values({
    code: 'TR-2', name: 'Torque rig 2', method: 'torque-sensor', location: 'Dock 2', createdAt: at,
    properties: { rangeNm: 0.5, torqueResolutionNm: 1e-6, torqueRelativeUncertainty: 0.001, torqueAbsoluteUncertaintyNm: 5e-6, angleResolutionRad: 1e-4, bandwidthHz: 500 },
  }).returning().get()
  db.insert(calibrations).values({
    rigId: rig.id, certificateNumber: 'CAL-2026-118', laboratory: 'Demo calibration laboratory', performedOn: '2026-03-14', dueOn: '2027-03-14',
    torqueRelativeUncertainty: 0.001, torqueAbsoluteUncertaintyNm: 5e-6, enteredById: engineer.personId, enteredAt: at,
  }).run()
  return { supplier, engineer, secondEngineer, inspector, contact, part, sheet, rig }
}

/** A delivery of the test part with listed serials 71-0001… */
export function delivery(quantity: number, supplierLot = 'TV-2611-083') {
  return {
    supplierCode: 'TUVALO', partNumber: 'KF-4412-C', supplierLot, quantity, orderNumber: 'PO-7731',
    serials: Array.from({ length: quantity }, (_, index) => `71-${String(index + 1).padStart(4, '0')}`),
  }
}
