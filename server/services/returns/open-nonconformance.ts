import { eq } from 'drizzle-orm'
import { lotLifecycle } from '#shared/compute/lifecycle/lot'
import { nonconformanceLifecycle } from '#shared/compute/lifecycle/nonconformance'
import type { Transaction } from '../../database/client'
import { plantYear, takeNumber } from '../../database/counters'
import { lots } from '../../database/schema/lots'
import { nonconformances } from '../../database/schema/returns'
import { now } from '../context'
import type { Services } from '../context'
import { appendToLogbook } from '../logbook/append'
import { writeRejectionNotices } from '../notices/rejection-notices'
import { ANSWER_WORKING_DAYS, addWorkingDays, plantDay } from './answer-due'
import { writeEntry } from './write-entry'

/**
 * Opens the nonconformance of a rejected lot, inside the transaction of the rejection: number without gaps, lot on hold, answer due after
 * `ANSWER_WORKING_DAYS`, the notices to the supplier in the outbox, and the logbook entry. The caller wakes the outbox after the commit.
 *
 * @param input.lotId a lot in state `rejected`.
 * @param input.paperId the certificate of rejection; the notices wait for its PDF.
 * @returns id and number, `N-2026-0012`.
 * @throws RangeError when the lot's state is not `rejected`.
 */
export function openNonconformance(services: Services, tx: Transaction, input: { actorId: number; lotId: number; paperId: number }): { id: number; number: string } {
  const lot = tx.select().from(lots).where(eq(lots.id, input.lotId)).get()!
  tx.update(lots).set({ state: lotLifecycle.transition(lot.state, 'hold') }).where(eq(lots.id, lot.id)).run()
  const { plantTimeZone } = services.settings
  const year = plantYear(services.clock(), plantTimeZone)
  const opened = tx.insert(nonconformances).values({
    number: `N-${year}-${String(takeNumber(tx, `nonconformance:${year}`)).padStart(4, '0')}`, lotId: lot.id, supplierId: lot.supplierId, state: nonconformanceLifecycle.initial,
    openedAt: now(services), answerDueOn: addWorkingDays(plantDay(services.clock(), plantTimeZone), ANSWER_WORKING_DAYS),
  }).returning().get()
  writeEntry(services, tx, { nonconformanceId: opened.id, kind: 'opened', text: `Lot ${lot.supplierLot} was rejected and put on hold.`, byId: input.actorId })
  const contacts = writeRejectionNotices(services, tx, opened, input.paperId)
  appendToLogbook(services, tx, {
    actorId: input.actorId, action: 'nonconformance.opened', subjectKind: 'nonconformance', subjectId: opened.number,
    content: { lot: lot.number, answerDueOn: opened.answerDueOn, contactsNotified: contacts },
  })
  return { id: opened.id, number: opened.number }
}
