import type { Transaction } from '../../database/client'
import { updateMail } from '../../mail/templates/update'
import type { Services } from '../context'
import type { Nonconformance } from '../returns/find-nonconformance'
import { engineers, supplierContacts } from './recipients'
import { writeNotice } from './write-notice'

/** Tells one side of a nonconformance that there is news from the other, in the transaction of the news. */
export function writeUpdateNotices(services: Services, tx: Transaction, nonconformance: Nonconformance, news: { to: 'supplier' | 'plant'; headline: string; paragraphs: readonly string[] }): void {
  const recipients = news.to === 'supplier' ? supplierContacts(tx, nonconformance.supplierId) : engineers(tx)
  const { origin, plantName } = services.settings
  for (const recipient of recipients) {
    const content = updateMail({ plantName, recipientName: recipient.name, nonconformance: nonconformance.number, headline: news.headline, paragraphs: news.paragraphs, link: `${origin}/returns/${nonconformance.number}` })
    writeNotice(services, tx, { kind: 'update', recipient, content, nonconformanceId: nonconformance.id, lotId: nonconformance.lotId, paperId: null })
  }
}
