import { and, eq } from 'drizzle-orm'
import { samples } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { getLot } from './find-lot'

/**
 * Binds a serial number to a drawn position of a lot that came without a list. It can be corrected until the motor is measured.
 *
 * @throws DomainError `conflict` when the serial stands at another position, the motor is measured, or the lot is decided.
 */
export function bindSerial(context: Context, input: { lotNumber: string; drawOrder: number; serial: string }): void {
  context.db.transaction((tx) => {
    const lot = getLot({ db: tx, actor: context.actor }, input.lotNumber)
    if (lot.decidedAt) throw new DomainError('conflict', `Lot ${lot.supplierLot} is decided; its serial numbers stay as they are.`)
    const sample = tx.select().from(samples).where(and(eq(samples.lotId, lot.id), eq(samples.drawOrder, input.drawOrder))).get()
    if (!sample) throw new DomainError('not-found', `Lot ${lot.supplierLot} has no drawn motor number ${input.drawOrder}.`)
    const other = tx.select().from(samples).where(and(eq(samples.lotId, lot.id), eq(samples.serial, input.serial))).get()
    if (other && other.id !== sample.id) throw new DomainError('conflict', `Serial ${input.serial} is bound to position ${other.position} already. Check both motors.`, { fields: [{ field: 'serial', message: 'Bound to another position.' }] })
    const measured = tx.select({ id: measurements.id }).from(measurements).where(eq(measurements.sampleId, sample.id)).limit(1).get()
    if (measured) throw new DomainError('conflict', `The motor at position ${sample.position} has been measured as ${sample.serial}; its serial cannot change any more.`)
    tx.update(samples).set({ serial: input.serial, boundById: context.actor.personId, boundAt: now(context) }).where(eq(samples.id, sample.id)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'sample.bound', subjectKind: 'lot', subjectId: lot.number, content: { position: sample.position, serial: input.serial } })
  }, { behavior: 'immediate' })
}
