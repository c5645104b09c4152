import { eq } from 'drizzle-orm'
import type { Transaction } from '../../database/client'
import { decisions, lots } from '../../database/schema/lots'
import { papers } from '../../database/schema/papers'
import { parts } from '../../database/schema/parts'
import { suppliers } from '../../database/schema/people'
import { rejectionMail } from '../../mail/templates/rejection'
import { updateMail } from '../../mail/templates/update'
import type { Services } from '../context'
import { countedMeasurements } from '../lots/counted-measurements'
import { dayInWords } from '../returns/answer-due'
import { failingMotors, likelyOrigins, motorName } from '../returns/failing-motors'
import type { Nonconformance } from '../returns/find-nonconformance'
import { engineers, supplierContacts } from './recipients'
import { writeNotice } from './write-notice'

/**
 * Writes the notice of a rejected lot to each first contact of its supplier, with the certificate; when there is no contact, tells the engineers so instead.
 *
 * @returns how many contacts are notified; 0 when there is none.
 */
export function writeRejectionNotices(services: Services, tx: Transaction, nonconformance: Nonconformance, paperId: number): number {
  const about = tx.select({ lot: lots, part: parts, supplier: suppliers, decision: decisions, paper: papers }).from(papers)
    .innerJoin(lots, eq(lots.id, papers.lotId)).innerJoin(decisions, eq(decisions.id, papers.decisionId)).innerJoin(parts, eq(parts.id, lots.partId))
    .innerJoin(suppliers, eq(suppliers.id, lots.supplierId)).where(eq(papers.id, paperId)).get()!
  const contacts = supplierContacts(tx, about.supplier.id)
  if (contacts.length === 0) {
    writeNoContact(services, tx, nonconformance, { supplier: about.supplier.name, supplierLot: about.lot.supplierLot })
    return 0
  }
  const counted = countedMeasurements(tx, about.lot.id)
  const { origin, plantName } = services.settings
  const shared = {
    plantName, nonconformance: nonconformance.number, lot: about.lot, part: about.part, verdictSentence: about.decision.lotVerdict.sentence,
    decisionReason: about.decision.overruled ? about.decision.reason : '',
    motors: failingMotors(tx, counted).map(motor => ({ name: motorName(motor), failures: motor.failures })),
    origins: likelyOrigins(counted), answerDueOn: dayInWords(nonconformance.answerDueOn), paperNumber: about.paper.number,
    links: { answer: `${origin}/returns/${nonconformance.number}`, check: `${origin}/check/${about.paper.token}` },
  }
  for (const recipient of contacts) {
    const content = rejectionMail({ ...shared, contactName: recipient.name })
    writeNotice(services, tx, { kind: 'rejection', recipient, content, nonconformanceId: nonconformance.id, lotId: nonconformance.lotId, paperId })
  }
  return contacts.length
}

function writeNoContact(services: Services, tx: Transaction, nonconformance: Nonconformance, about: { supplier: string; supplierLot: string }): void {
  const { origin, plantName } = services.settings
  for (const recipient of engineers(tx)) {
    const content = updateMail({
      plantName, recipientName: recipient.name, nonconformance: nonconformance.number, headline: `${about.supplier} has no contact, nobody was told of the rejection`,
      paragraphs: [
        `Lot ${about.supplierLot} was rejected, but ${about.supplier} has no enabled first contact for notices, so no notice was written to them.`,
        'Let the administrator add a contact with notice rank 1 under People, then press "Send again" beside this notice on the page.',
      ],
      link: `${origin}/returns/${nonconformance.number}`,
    })
    writeNotice(services, tx, { kind: 'no-contact', recipient, content, nonconformanceId: nonconformance.id, lotId: nonconformance.lotId, paperId: null })
  }
}
