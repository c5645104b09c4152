import { formatCount } from '#shared/compute/sampling/wording'
import { composeMail } from './layout'
import type { MailBlock, MailContent } from './layout'

/** What the notice of a rejected lot says. */
export interface RejectionNotice {
  plantName: string
  contactName: string
  nonconformance: string
  lot: { supplierLot: string; quantity: number; orderNumber: string }
  part: { number: string; name: string }
  /** What the plan made of the sample, one or two sentences. */
  verdictSentence: string
  /** A person's reason for rejecting against the plan; '' when the plan rejected. */
  decisionReason: string
  /** The nonconforming motors, each with a sentence for every characteristic beyond its limit. */
  motors: readonly { name: string; failures: readonly { label: string; reason: string }[] }[]
  /** Likely origins, in words. */
  origins: readonly string[]
  /** Day by which the answer is expected, as people read it. */
  answerDueOn: string
  paperNumber: string
  links: { answer: string; check: string }
}

/** More motors than these are left to the page; a mail is no table. */
const MOST_MOTORS = 25
const MOST_ORIGINS = 8

/** The notice that tells a supplier's contact what was rejected, by how much, why it likely is so, and what is asked. */
export function rejectionMail(notice: RejectionNotice): MailContent {
  return composeMail({
    subject: `${notice.nonconformance}: lot ${notice.lot.supplierLot} of ${notice.part.number} rejected, answer by ${notice.answerDueOn}`,
    plantName: notice.plantName,
    blocks: [...opening(notice), ...motorBlocks(notice), ...originBlocks(notice), ...asked(notice)],
    footer: `Sent by ${notice.plantName}, incoming inspection, about ${notice.nonconformance}. Answer on the page above rather than to this mail.`,
  })
}

function opening({ contactName, lot, part, nonconformance, answerDueOn, verdictSentence, decisionReason }: RejectionNotice): MailBlock[] {
  const facts: [string, string][] = [
    ['Your lot', lot.supplierLot], ['Part', `${part.number}, ${part.name}`], ['Quantity', `${formatCount(lot.quantity)} motors`],
    ...(lot.orderNumber ? [['Order', lot.orderNumber] as [string, string]] : []),
    ['Our number', nonconformance], ['Please answer by', answerDueOn],
  ]
  return [
    { kind: 'paragraph', text: `Dear ${contactName},` },
    { kind: 'paragraph', text: `we measured a random sample of your delivery and had to reject the lot. It is on hold here. ${verdictSentence}` },
    ...(decisionReason ? [{ kind: 'paragraph' as const, text: `Reason given with the decision: ${decisionReason}` }] : []),
    { kind: 'facts', rows: facts },
  ]
}

function motorBlocks({ motors }: RejectionNotice): MailBlock[] {
  if (motors.length === 0) return []
  const shown = motors.slice(0, MOST_MOTORS)
  const left = motors.length - shown.length
  return [
    { kind: 'heading', text: motors.length === 1 ? 'The motor beyond its limits' : `The ${motors.length} motors beyond their limits` },
    { kind: 'groups', groups: shown.map(motor => ({ name: motor.name, lines: motor.failures.map(failure => `${failure.label}: ${failure.reason}`) })) },
    ...(left > 0 ? [{ kind: 'paragraph' as const, text: `${left} more ${left === 1 ? 'motor is' : 'motors are'} listed on the page below.` }] : []),
  ]
}

function originBlocks({ origins }: RejectionNotice): MailBlock[] {
  if (origins.length === 0) return []
  return [
    { kind: 'heading', text: 'Where it likely comes from' },
    { kind: 'list', items: origins.slice(0, MOST_ORIGINS) },
    { kind: 'paragraph', text: 'This is read from the orders in the torque maps; it points at a side of the motor, not at a culprit.' },
  ]
}

function asked({ answerDueOn, links, paperNumber }: RejectionNotice): MailBlock[] {
  return [
    { kind: 'heading', text: 'What we ask of you' },
    { kind: 'paragraph', text: `Please acknowledge this notice now, and by ${answerDueOn} tell us what you did at once, what caused it, and what you changed.` },
    { kind: 'action', text: 'Open the page, see the maps and answer', link: links.answer },
    { kind: 'paragraph', text: `The certificate of rejection ${paperNumber} belongs to this notice. Anyone who holds it can check that it is genuine at ${links.check}` },
  ]
}
