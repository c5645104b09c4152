import type { Disposition } from '#shared/compute/lifecycle/lot'
import type { NonconformanceState } from '#shared/compute/lifecycle/nonconformance'
import type { EntryKind, NoticeView } from '#shared/contracts/returns'

const STATES: Record<NonconformanceState, string> = {
  'open': 'notice on its way', 'notified': 'to acknowledge', 'acknowledged': 'to answer', 'answered': 'answered, to review', 'accepted-answer': 'answer accepted', 'sent-back': 'sent back, to answer again', 'closed': 'closed',
}

/** What a nonconformance waits for, in a word or three. */
export const nonconformanceStateWord = (state: NonconformanceState): string => STATES[state]

/** Whether the supplier is asked to do something. */
export const awaitsSupplier = (state: NonconformanceState): boolean => ['open', 'notified', 'acknowledged', 'sent-back'].includes(state)

export const DISPOSITION_WORDS: Record<Disposition, { title: string; text: string }> = {
  'return-to-supplier': { title: 'Return to the supplier', text: 'The whole lot goes back.' },
  'sort': { title: 'Sort all', text: 'Every motor is measured; the nonconforming ones are taken out.' },
  'rework': { title: 'Rework', text: 'The lot is put right and measured again.' },
  'concession': { title: 'Use under concession', text: 'Accepted against the plan, on the record. Signed with your password.' },
  'scrap': { title: 'Scrap', text: 'The whole lot is destroyed.' },
}

const ENTRIES: Record<EntryKind, string> = {
  'opened': 'Opened', 'notified': 'Notice sent', 'acknowledged': 'Acknowledged', 'answer-containment': 'Answer: containment', 'answer-cause': 'Answer: cause', 'answer-corrective': 'Answer: corrective action',
  'answer-preventive': 'Answer: preventive action', 'answer-accepted': 'Answer accepted', 'answer-sent-back': 'Answer sent back', 'disposition': 'Disposition', 'message': 'Message', 'closed': 'Closed',
}
export const entryWord = (kind: EntryKind): string => ENTRIES[kind]

/** How a notice stands, in a few words. */
export function noticeStateWord(notice: NoticeView): string {
  if (notice.state === 'sent') return 'sent'
  if (notice.state === 'given-up') return `given up after ${notice.attempts} ${notice.attempts === 1 ? 'try' : 'tries'}`
  if (notice.waitsForPaper) return 'waits for the certificate to be drawn'
  return notice.attempts === 0 ? 'about to be sent' : `not sent yet, ${notice.attempts} ${notice.attempts === 1 ? 'try' : 'tries'} failed`
}
