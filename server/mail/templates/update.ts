import { composeMail } from './layout'
import type { MailContent } from './layout'

/** A short notice that something happened about a nonconformance. */
export interface UpdateNotice {
  plantName: string
  recipientName: string
  nonconformance: string
  /** Subject after the number: "answer sent back". */
  headline: string
  /** Sentences, then what was written. */
  paragraphs: readonly string[]
  link: string
}

/** Tells the other side that there is news, with the words that were written, and where to go. */
export function updateMail(notice: UpdateNotice): MailContent {
  return composeMail({
    subject: `${notice.nonconformance}: ${notice.headline}`,
    plantName: notice.plantName,
    blocks: [
      { kind: 'paragraph', text: `Dear ${notice.recipientName},` },
      ...notice.paragraphs.map(text => ({ kind: 'paragraph' as const, text })),
      { kind: 'action', text: `Open ${notice.nonconformance}`, link: notice.link },
    ],
    footer: `Sent by ${notice.plantName}, incoming inspection, about ${notice.nonconformance}. Answer on the page above rather than to this mail.`,
  })
}
