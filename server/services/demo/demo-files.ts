import { asc, eq } from 'drizzle-orm'
import { strToU8, zipSync } from 'fflate'
import { waitingFiles } from '../../database/seed/sample-files'
import { lotsToday, pastLots } from '../../database/seed/scenario/lots'
import type { WaitingLot } from '../../database/seed/scenario/lots'
import { partOf } from '../../database/seed/scenario/parts'
import { demoDay } from '../../database/seed/seed-demo'
import { parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { samples } from '../../database/schema/lots'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { getLot } from '../lots/find-lot'

/** Demo only: the files that a rig would have written for a lot's drawn motors, as a zip. */
export function getDemoFiles(context: Context, number: string): { name: string; bytes: Uint8Array } {
  if (!context.settings.demo) throw new DomainError('not-found', 'This is not a demo.')
  const lot = getLot(context, number)
  const { db } = context
  const part = db.select({ number: parts.number }).from(parts).where(eq(parts.id, lot.partId)).get()!
  const supplier = db.select({ code: suppliers.code }).from(suppliers).where(eq(suppliers.id, lot.supplierId)).get()!
  const drawn = db.select().from(samples).where(eq(samples.lotId, lot.id)).orderBy(asc(samples.drawOrder)).all()
  const files = waitingFiles(scenarioLot(context, lot.supplierLot, part.number, supplier.code, lot.quantity), drawn)
  const readme = 'Torque maps of the drawn motors, one file each. Drop them on the page of the lot. Choose rig TR-1 or TR-2.\n'
  const content = Object.fromEntries([...files.map(file => [file.name, file.bytes] as const), ['read-me-first.md', strToU8(readme)] as const])
  return { name: `${lot.supplierLot}.zip`, bytes: zipSync(content, { level: 6, mtime: new Date('2026-01-01T00:00:00Z') }) }
}

/** The lot of the scenario with that number; for any other, good motors of the part. */
function scenarioLot(context: Context, supplierLot: string, part: string, supplier: string, quantity: number): WaitingLot {
  const day = demoDay(context)
  const waiting = lotsToday(day).find(lot => lot.supplierLot === supplierLot)
  if (waiting) return waiting
  try {
    partOf(part)
  }
  catch {
    throw new DomainError('not-found', `There are no demo files for part ${part}.`)
  }
  const known = pastLots(day, 'full').find(lot => lot.supplierLot === supplierLot)
  return { ...(known ?? { supplier, part, supplierLot, quantity, daysAgo: 0, made: {} }), received: true, serialsListed: true, split: false, dialects: ['plain'], faults: [], title: '' }
}
