import type { Transaction } from '../../database/client'
import { notices } from '../../database/schema/returns'
import { domainOf } from '../../mail/address'
import type { MailContent } from '../../mail/templates/layout'
import { now, randomHex } from '../context'
import type { Services } from '../context'

export type NoticeKind = 'rejection' | 'no-contact' | 'update'

/** Who gets a notice. */
export interface Recipient {
  personId: number | null
  name: string
  address: string
}

/**
 * Puts a mail into the outbox, inside the transaction of what it tells about: either both stand or neither. It is sent later by `sendNotices`; whoever
 * commits wakes the outbox.
 *
 * @param notice.paperId when set, the mail waits until this paper's PDF is stored and carries it.
 * @returns the notice's id.
 */
export function writeNotice(services: Pick<Services, 'clock' | 'randomBytes' | 'settings'>, tx: Transaction, notice: {
  kind: NoticeKind
  recipient: Recipient
  content: MailContent
  nonconformanceId: number | null
  lotId: number | null
  paperId: number | null
}): number {
  const at = now(services)
  return tx.insert(notices).values({
    messageId: `<notice.${randomHex(services, 16)}@${domainOf(services.settings.mailSender)}>`,
    kind: notice.kind, nonconformanceId: notice.nonconformanceId, lotId: notice.lotId, recipientId: notice.recipient.personId, recipientAddress: notice.recipient.address,
    ...notice.content, paperId: notice.paperId, state: 'queued', nextAttemptAt: at, createdAt: at,
  }).returning({ id: notices.id }).get().id
}
