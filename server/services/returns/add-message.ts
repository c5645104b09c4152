import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { writeUpdateNotices } from '../notices/update-notices'
import { getNonconformance } from './find-nonconformance'
import { writeEntry } from './write-entry'

/**
 * A message to the other side, kept on the page and sent by mail.
 *
 * @throws DomainError `not-found`; `conflict` when closed.
 */
export function addMessage(context: Context, number: string, text: string): void {
  context.db.transaction((tx) => {
    const found = getNonconformance({ db: tx, actor: context.actor }, number)
    if (found.state === 'closed') throw new DomainError('conflict', `${number} is closed; nothing can be added. The message was not kept.`)
    writeEntry(context, tx, { nonconformanceId: found.id, kind: 'message', text, byId: context.actor.personId })
    const to = context.actor.role === 'supplier' ? 'plant' : 'supplier'
    writeUpdateNotices(context, tx, found, { to, headline: 'a message for you', paragraphs: [`${context.actor.name} writes:`, text] })
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'nonconformance.message', subjectKind: 'nonconformance', subjectId: number, content: { to } })
  }, { behavior: 'immediate' })
  context.wake('outbox')
}
