import { eq } from 'drizzle-orm'
import { nonconformances } from '../../database/schema/returns'
import { now } from '../context'
import type { Context } from '../context'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { changeState } from './change-state'
import { getNonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/**
 * The supplier's contact confirms having read the notice. Doing it twice changes nothing and gives the first answer again. A contact who finds the
 * nonconformance on the page before the mail went out is thereby notified.
 *
 * @throws DomainError `not-found`.
 */
export function acknowledgeNonconformance(context: Context, number: string): { acknowledgedAt: string } {
  const answer = context.db.transaction((tx) => {
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    if (found.acknowledgedAt) return { acknowledgedAt: found.acknowledgedAt }
    const state = found.state === 'open' ? changeState(tx, found, 'notify') : found.state
    changeState(tx, { ...found, state }, 'acknowledge')
    const acknowledgedAt = now(context)
    tx.update(nonconformances).set({ acknowledgedAt, acknowledgedById: context.actor.personId }).where(eq(nonconformances.id, found.id)).run()
    writeEntry(context, tx, { nonconformanceId: found.id, kind: 'acknowledged', text: 'The notice was read.', byId: context.actor.personId })
    writeUpdateNotices(context, tx, found, { to: 'plant', headline: 'acknowledged by the supplier', paragraphs: ['The supplier has acknowledged the notice of rejection.'] })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'nonconformance.acknowledged', subjectKind: 'nonconformance', subjectId: number })
    return { acknowledgedAt }
  }, { behavior: 'immediate' })
  context.wake('outbox')
  return answer
}
