import { answerSchema } from '#shared/contracts/returns'
import type { EntryKind, SupplierAnswer } from '#shared/contracts/returns'
import type { Context } from '../context'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { changeState } from './change-state'
import { getNonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/**
 * The supplier's answer: containment, cause, corrective and, if any, preventive action. It can be given once acknowledged, and again when sent back.
 *
 * @throws DomainError `not-found`; `conflict` when it is not the supplier's turn.
 */
export function answerNonconformance(context: Context, number: string, input: SupplierAnswer): void {
  const answer = answerSchema.parse(input)
  const parts: [EntryKind, string, string][] = [
    ['answer-containment', 'Containment', answer.containment], ['answer-cause', 'Cause', answer.cause],
    ['answer-corrective', 'Corrective action', answer.correctiveAction], ['answer-preventive', 'Preventive action', answer.preventiveAction],
  ]
  const given = parts.filter(([, , text]) => text !== '')
  context.db.transaction((tx) => {
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    changeState(tx, found, 'answer')
    for (const [kind, , text] of given) writeEntry(context, tx, { nonconformanceId: found.id, kind, text, byId: context.actor.personId })
    writeUpdateNotices(context, tx, found, { to: 'plant', headline: 'the supplier has answered', paragraphs: ['The supplier has answered. Please review the answer.', ...given.map(([, name, text]) => `${name}: ${text}`)] })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'nonconformance.answered', subjectKind: 'nonconformance', subjectId: number, content: { parts: given.length } })
  }, { behavior: 'immediate' })
  context.wake('outbox')
}
