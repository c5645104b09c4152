import { z } from 'zod'
import type { CharacteristicVerdict, Verdict } from '../compute/terms/judgement'
import type { Disposition, LotState } from '../compute/lifecycle/lot'
import { DISPOSITIONS } from '../compute/lifecycle/lot'
import type { NonconformanceState } from '../compute/lifecycle/nonconformance'

const reason = (longest: number) => z.string().trim().min(3, 'Give the reason in a few words.').max(longest, `At most ${longest} characters.`)
const paragraph = (ask: string) => z.string().trim().min(3, ask).max(4000, 'At most 4 000 characters.')

/** Query of the list of nonconformances; the same words stand in the page's address. */
export const nonconformanceListSchema = z.object({
  text: z.string().trim().max(100).default(''),
  /** open: everything not closed; waiting: the supplier has yet to answer; answered: the engineer has yet to review. */
  state: z.enum(['', 'open', 'waiting', 'answered', 'closed']).catch(''),
  /** Supplier's code. */
  supplier: z.string().max(40).default(''),
  sort: z.enum(['openedAt', 'answerDueOn', 'number', 'supplier', 'supplierLot', 'state']).catch('openedAt'),
  order: z.enum(['rising', 'falling']).catch('falling'),
  page: z.coerce.number().int().min(1).catch(1),
})
export type NonconformanceListQuery = z.output<typeof nonconformanceListSchema>

export interface NonconformanceSummary {
  number: string
  state: NonconformanceState
  supplier: string
  lotNumber: string
  supplierLot: string
  partNumber: string
  partName: string
  openedAt: string
  /** Calendar day in the plant's time zone. */
  answerDueOn: string
  /** The supplier's answer is due and has not come. */
  overdue: boolean
  disposition: Disposition | null
}

export interface NonconformanceListAnswer {
  rows: NonconformanceSummary[]
  total: number
  pageSize: number
  /** Suppliers to filter by; empty for a supplier's contact. */
  suppliers: { code: string; name: string }[]
}

export const nonconformanceParamsSchema = z.object({ number: z.string().max(40) })
export const noticeParamsSchema = z.object({ number: z.string().max(40), id: z.coerce.number().int().min(1) })

export const dispositionSchema = z.object({
  disposition: z.enum(DISPOSITIONS as [Disposition, ...Disposition[]], 'Choose what happens to the lot.'),
  reason: reason(1000),
  /** Needed for a concession, which is signed. */
  password: z.string().max(500).default(''),
})
export type DispositionInput = z.input<typeof dispositionSchema>

export const messageSchema = z.object({ text: paragraph('Write the message.') })

/** The supplier's answer in its four parts. */
export const answerSchema = z.object({
  containment: paragraph('Say what was done at once, so that no more such motors reach us.'),
  cause: paragraph('Say what caused it.'),
  correctiveAction: paragraph('Say what was changed so that it does not happen again.'),
  preventiveAction: z.string().trim().max(4000, 'At most 4 000 characters.').default(''),
})
export type SupplierAnswer = z.input<typeof answerSchema>

export const reviewSchema = z.object({ outcome: z.enum(['accepted', 'sent-back'], 'Accept the answer or send it back.'), reason: reason(2000) })
export const closingSchema = z.object({ reason: reason(1000) })

/** What was said and done about a nonconformance, oldest first. */
export const ENTRY_KINDS = [
  'opened', 'notified', 'acknowledged', 'answer-containment', 'answer-cause', 'answer-corrective', 'answer-preventive', 'answer-accepted', 'answer-sent-back', 'disposition', 'message', 'closed',
] as const
export type EntryKind = typeof ENTRY_KINDS[number]

export interface NonconformanceEntry {
  id: number
  kind: EntryKind
  text: string
  /** null: the station itself. */
  by: string | null
  side: 'supplier' | 'plant'
  at: string
}

export type NoticeState = 'queued' | 'sent' | 'given-up'

export interface NoticeView {
  id: number
  kind: string
  subject: string
  recipientAddress: string
  state: NoticeState
  attempts: number
  nextAttemptAt: string
  /** What the mail server said last, in words. */
  lastError: string | null
  sentAt: string | null
  createdAt: string
  /** The certificate's PDF is not drawn yet; the mail goes out when it is. */
  waitsForPaper: boolean
}

/** A nonconforming motor of the sample. */
export interface FailingMotor {
  serial: string | null
  drawOrder: number
  position: number
  verdict: Verdict | null
  /** Cogging over one turn for a small ring, N·m. */
  ring: number[]
  /** The characteristics beyond their limits. */
  failures: (CharacteristicVerdict & { label: string })[]
  /** Raw files that the figures were computed from. */
  files: { name: string; sha256: string; size: number }[]
}

/** What the person who looks may do now; drives the buttons. */
export type ReturnsAction = 'acknowledge' | 'answer' | 'review' | 'disposition' | 'message' | 'resend' | 'close'

export interface NonconformancePage {
  number: string
  state: NonconformanceState
  openedAt: string
  answerDueOn: string
  overdue: boolean
  acknowledgedAt: string | null
  acknowledgedBy: string | null
  closedAt: string | null
  supplier: string
  lot: { number: string; supplierLot: string; quantity: number; sampleSize: number; judged: number; orderNumber: string; state: LotState; receivedAt: string; verdictSentence: string }
  part: { number: string; name: string; designOrder: number }
  sheetVersion: number
  limitPeakToPeakNm: number | null
  /** Why a person rejected against the plan; '' when the plan itself rejected. */
  decisionReason: string
  failing: FailingMotor[]
  /** Sentences on the likely origin of what fails. */
  explanation: string[]
  paper: { number: string; checkLink: string; pdfReady: boolean } | null
  disposition: { kind: Disposition; reason: string; by: string; at: string } | null
  entries: NonconformanceEntry[]
  notices: NoticeView[]
  allowed: ReturnsAction[]
}

export const resultsQuerySchema = z.object({ format: z.enum(['csv', 'json'], 'The results come as csv or json.').default('csv') })

/** A message that the demo's mail server took. */
export interface DemoMailSummary { id: string; receivedAt: string; from: string; to: string; subject: string; attachments: number }
export interface DemoMail extends DemoMailSummary {
  messageId: string
  text: string
  html: string
  files: { name: string; type: string; size: number }[]
}
export interface DemoMailboxAnswer { messages: DemoMailSummary[] }
export const demoMailParamsSchema = z.object({ id: z.string().regex(/^[0-9a-f-]{8,60}$/, 'There is no such message.') })
export const demoAttachmentParamsSchema = demoMailParamsSchema.extend({ ordinal: z.coerce.number().int().min(0).max(100) })
