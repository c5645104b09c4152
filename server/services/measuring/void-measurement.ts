import { eq } from 'drizzle-orm'
import { lots } from '../../database/schema/lots'
import { measurements } from '../../database/schema/measurements'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { advanceLot } from './store-measurement'

/**
 * Voids an attempt with a reason; it stays on record and the next valid attempt counts.
 *
 * @throws DomainError `conflict` when it is void already or its lot is decided.
 */
export function voidMeasurement(context: Context, input: { id: number; reason: string }): void {
  context.db.transaction((tx) => {
    const found = tx.select({ measurement: measurements, lot: lots }).from(measurements).innerJoin(lots, eq(lots.id, measurements.lotId)).where(eq(measurements.id, input.id)).get()
    if (!found) throw new DomainError('not-found', 'There is no such measurement.')
    if (found.lot.decidedAt) throw new DomainError('conflict', `Lot ${found.lot.supplierLot} is decided; its measurements stay as they are.`)
    if (found.measurement.voidedAt) throw new DomainError('conflict', 'This attempt is void already.')
    tx.update(measurements).set({ voidedAt: now(context), voidedById: context.actor.personId, voidReason: input.reason }).where(eq(measurements.id, input.id)).run()
    advanceLot(tx, found.lot)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'motor.voided', subjectKind: 'measurement', subjectId: input.id, content: { lot: found.lot.number } })
  }, { behavior: 'immediate' })
}
