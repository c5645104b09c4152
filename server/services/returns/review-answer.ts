import type { z } from 'zod'
import type { reviewSchema } from '#shared/contracts/returns'
import type { Context } from '../context'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { changeState } from './change-state'
import { getNonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/**
 * The engineer accepts the supplier's answer or sends it back, with a reason; an accepted one may be sent back later, when the next lots do not bear it out.
 *
 * @throws DomainError `not-found`; `conflict` when there is no answer to review.
 */
export function reviewAnswer(context: Context, number: string, review: z.output<typeof reviewSchema>): void {
  const accepted = review.outcome === 'accepted'
  context.db.transaction((tx) => {
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    changeState(tx, found, accepted ? 'accept-answer' : 'send-back')
    writeEntry(context, tx, { nonconformanceId: found.id, kind: accepted ? 'answer-accepted' : 'answer-sent-back', text: review.reason, byId: context.actor.personId })
    writeUpdateNotices(context, tx, found, {
      to: 'supplier', headline: accepted ? 'your answer is accepted' : 'your answer is sent back',
      paragraphs: [accepted ? 'Your answer is accepted. We watch the next lots before we close this.' : 'We cannot accept your answer yet. Please answer again on the page.', review.reason],
    })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: `nonconformance.answer-${review.outcome}`, subjectKind: 'nonconformance', subjectId: number })
  }, { behavior: 'immediate' })
  context.wake('outbox')
}
