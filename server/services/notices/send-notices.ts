import { and, asc, eq, isNotNull, isNull, lte, or } from 'drizzle-orm'
import type { EvenlotDatabase } from '../../database/client'
import { papers } from '../../database/schema/papers'
import { nonconformances, notices } from '../../database/schema/returns'
import { isSingleAddress } from '../../mail/address'
import type { MailMessage, MailTransport } from '../../mail/transport'
import { now } from '../context'
import type { Services } from '../context'
import { appendToLogbook } from '../logbook/append'
import { getPaperPdf } from '../papers/get-paper-pdf'
import { changeState } from '../returns/change-state'
import { writeEntry } from '../returns/write-entry'

/** Common practice, no source: the wait doubles from one minute up to six hours, and after twelve tries (about a day) the notice is given up. */
export const RETRY = { firstWaitMs: 60_000, longestWaitMs: 6 * 3_600_000, tries: 12 } as const
/** Common practice, no source: many mail servers refuse more than 10 MB, and an attachment grows by a third on its way. */
const LARGEST_ATTACHMENT = 8 * 1024 * 1024

type Notice = typeof notices.$inferSelect
interface Due { notice: Notice; paper: typeof papers.$inferSelect | null }

const running = new WeakMap<EvenlotDatabase, Promise<void>>()

/**
 * Sends what is due in the outbox until nothing is: oldest first, a notice with a paper only when its PDF is stored. A mail that the server takes is marked
 * sent; one that it does not is tried again later, and given up after the last try with the server's words kept.
 *
 * Delivery is at least once: the Message-ID stays the same over tries, and a duplicate is possible only when the process dies between the server's
 * acceptance and the mark. Two calls never send at the same time; the second waits for the first.
 */
export function sendNotices(services: Services, transport: MailTransport): Promise<void> {
  const before = running.get(services.db) ?? Promise.resolve()
  const mine = before.catch(() => undefined).then(() => sendAll(services, transport))
  running.set(services.db, mine)
  return mine
}

async function sendAll(services: Services, transport: MailTransport): Promise<void> {
  for (let due = nextDue(services); due; due = nextDue(services)) {
    try {
      if (!isSingleAddress(due.notice.recipientAddress)) throw new UnusableAddress(due.notice.recipientAddress)
      await transport.send(await messageOf(services, due))
    }
    catch (error) {
      markFailed(services, due.notice, error)
      continue
    }
    markSent(services, due.notice)
  }
}

class UnusableAddress extends Error {
  constructor(address: string) {
    super(`"${address}" is not one mail address. Let the administrator correct it under People, then send the notice again.`)
  }
}

function nextDue(services: Services): Due | null {
  const row = services.db.select({ notice: notices, paper: papers }).from(notices).leftJoin(papers, eq(papers.id, notices.paperId))
    .where(and(eq(notices.state, 'queued'), lte(notices.nextAttemptAt, now(services)), or(isNull(notices.paperId), isNotNull(papers.pdfSha256))))
    .orderBy(asc(notices.nextAttemptAt), asc(notices.id)).limit(1).get()
  return row ?? null
}

async function messageOf(services: Services, { notice, paper }: Due): Promise<MailMessage> {
  const attachments: MailMessage['attachments'] = []
  const pdf = paper ? await getPaperPdf(services, paper) : null
  // A larger one is reached by the link that every such mail carries.
  if (pdf && pdf.bytes.length <= LARGEST_ATTACHMENT) attachments.push(pdf)
  return { messageId: notice.messageId, to: notice.recipientAddress, subject: notice.subject, text: notice.text, html: notice.html, attachments }
}

function markSent(services: Services, notice: Notice): void {
  services.db.transaction((tx) => {
    tx.update(notices).set({ state: 'sent', attempts: notice.attempts + 1, sentAt: now(services), lastError: null }).where(eq(notices.id, notice.id)).run()
    appendToLogbook(services, tx, { actorId: null, action: 'notice.sent', subjectKind: 'notice', subjectId: notice.id, content: { kind: notice.kind, attempts: notice.attempts + 1 } })
    if (notice.kind !== 'rejection' || notice.nonconformanceId === null) return
    const nonconformance = tx.select().from(nonconformances).where(eq(nonconformances.id, notice.nonconformanceId)).get()!
    if (nonconformance.state !== 'open') return
    changeState(tx, nonconformance, 'notify')
    writeEntry(services, tx, { nonconformanceId: nonconformance.id, kind: 'notified', text: 'The notice of rejection was sent.', byId: null })
  }, { behavior: 'immediate' })
}

function markFailed(services: Services, notice: Notice, error: unknown): void {
  const attempts = notice.attempts + 1
  const givenUp = attempts >= RETRY.tries || error instanceof UnusableAddress
  const wait = Math.min(RETRY.longestWaitMs, RETRY.firstWaitMs * 2 ** (attempts - 1))
  const lastError = (error instanceof Error ? error.message : String(error)).slice(0, 500)
  services.db.transaction((tx) => {
    tx.update(notices).set({ attempts, lastError, state: givenUp ? 'given-up' : 'queued', nextAttemptAt: new Date(services.clock().getTime() + wait).toISOString() }).where(eq(notices.id, notice.id)).run()
    if (givenUp) appendToLogbook(services, tx, { actorId: null, action: 'notice.given-up', subjectKind: 'notice', subjectId: notice.id, content: { kind: notice.kind, attempts } })
  }, { behavior: 'immediate' })
}
