import { and, desc, eq } from 'drizzle-orm'
import type { Transaction } from '../../database/client'
import { papers } from '../../database/schema/papers'
import { people } from '../../database/schema/people'
import { notices } from '../../database/schema/returns'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'
import { getNonconformance } from '../returns/find-nonconformance'
import type { Nonconformance } from '../returns/find-nonconformance'
import { writeRejectionNotices } from './rejection-notices'
import { writeNotice } from './write-notice'

type Notice = typeof notices.$inferSelect

/**
 * Sends a notice again, to the address that its recipient has now. One that was never sent starts over with its first try; one that was sent goes out as a
 * new mail; the notice that a supplier had no contact becomes the rejection notice, once there is a contact.
 *
 * @throws DomainError `not-found`; `conflict` when the supplier has no contact still, or the recipient's account is disabled.
 */
export function resendNotice(context: Context, number: string, noticeId: number): void {
  context.db.transaction((tx) => {
    const nonconformance = getNonconformance({ db: tx, actor: context.actor }, number)
    const notice = tx.select().from(notices).where(and(eq(notices.id, noticeId), eq(notices.nonconformanceId, nonconformance.id))).get()
    if (!notice) throw new DomainError('not-found', `${number} has no such notice.`)
    if (notice.kind === 'no-contact') notifyContacts(context, tx, nonconformance)
    else sendAgain(context, tx, notice)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'notice.sent-again', subjectKind: 'notice', subjectId: notice.id, content: { nonconformance: number, kind: notice.kind } })
  }, { behavior: 'immediate' })
  // The certificate may be an old one that was never drawn.
  context.wake('papers')
  context.wake('outbox')
}

function sendAgain(context: Context, tx: Transaction, notice: Notice): void {
  const person = notice.recipientId === null ? undefined : tx.select().from(people).where(eq(people.id, notice.recipientId)).get()
  if (person?.disabledAt) throw new DomainError('conflict', 'The account of this recipient is disabled. Nothing was sent; let the administrator name another contact.')
  const address = person?.email ?? notice.recipientAddress
  if (notice.state === 'sent') {
    const { subject, text, html, nonconformanceId, lotId, paperId } = notice
    writeNotice(context, tx, { kind: notice.kind as 'rejection' | 'update', recipient: { personId: notice.recipientId, name: '', address }, content: { subject, text, html }, nonconformanceId, lotId, paperId })
    return
  }
  tx.update(notices).set({ state: 'queued', attempts: 0, nextAttemptAt: now(context), lastError: null, recipientAddress: address }).where(eq(notices.id, notice.id)).run()
}

function notifyContacts(context: Context, tx: Transaction, nonconformance: Nonconformance): void {
  const told = tx.select({ id: notices.id }).from(notices).where(and(eq(notices.nonconformanceId, nonconformance.id), eq(notices.kind, 'rejection'))).get()
  if (told) throw new DomainError('conflict', 'The supplier\'s contact has a notice already. Nothing was sent; send that one again if it is needed.')
  const paper = tx.select().from(papers).where(and(eq(papers.lotId, nonconformance.lotId), eq(papers.kind, 'rejection'))).orderBy(desc(papers.id)).get()
  if (!paper) throw new DomainError('conflict', 'There is no certificate of rejection for this lot.')
  // With no contact still, the transaction is rolled back, and with it the second notice that says so.
  if (writeRejectionNotices(context, tx, nonconformance, paper.id) === 0) throw new DomainError('conflict', 'The supplier still has no enabled contact with notice rank 1. Nothing was sent; let the administrator add one under People.')
}
