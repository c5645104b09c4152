import { eq } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import { lots } from '../../database/schema/lots'
import { nonconformances } from '../../database/schema/returns'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { changeState } from './change-state'
import { getNonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/**
 * Closes a nonconformance and its lot, when the answer is accepted and the lot's disposition decided; the reason says how the action was verified.
 *
 * @throws DomainError `not-found`; `conflict` when something is still open.
 */
export function closeNonconformance(context: Context, number: string, reason: string): void {
  context.db.transaction((tx) => {
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    const lot = tx.select().from(lots).where(eq(lots.id, found.lotId)).get()!
    changeState(tx, found, 'close')
    if (lot.state !== 'dispositioned') throw new DomainError('conflict', `What happens to lot ${lot.supplierLot} is not decided yet. Decide the disposition first; nothing was changed.`)
    tx.update(lots).set({ state: lotLifecycle.transition(lot.state, 'close') }).where(eq(lots.id, lot.id)).run()
    tx.update(nonconformances).set({ closedAt: now(context) }).where(eq(nonconformances.id, found.id)).run()
    writeEntry(context, tx, { nonconformanceId: found.id, kind: 'closed', text: reason, byId: context.actor.personId })
    writeUpdateNotices(context, tx, found, { to: 'supplier', headline: 'closed', paragraphs: [`${number} is closed.`, reason] })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'nonconformance.closed', subjectKind: 'nonconformance', subjectId: number, content: { lot: lot.number } })
  }, { behavior: 'immediate' })
  context.wake('outbox')
}
