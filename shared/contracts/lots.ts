import { z } from 'zod'
import type { CharacteristicVerdict, LotVerdict, NonconformityClass, SamplingPlan, Verdict } from '../compute/terms/judgement'
import type { ColumnRecipe, Fault, OrderAmplitude, Warning } from '../compute/terms/measurement'
import type { MotorDesign } from '../compute/terms/motor'
import type { LotState } from '../compute/lifecycle/lot'

const trimmed = (longest: number) => z.string().trim().max(longest, `At most ${longest} characters.`)

/** The scan field: a code's content, a lot number, a serial, a paper's number. */
export const scanSchema = z.object({ text: z.string().min(1, 'Scan a label or type a number.').max(2000, 'This is longer than any label; scan again.') })

export type ScanAnswer =
  /** Go there. */
  | { kind: 'open'; link: string; what: string }
  /** The text fits more than one thing. */
  | { kind: 'choose'; choices: { link: string; what: string }[] }
  /** A delivery not yet received: what the label says, for the receiving form. */
  | { kind: 'receive'; form: ReceivingPrefill; notes: string[] }
  | { kind: 'problem'; problems: { sentence: string; remedy: string }[]; form: ReceivingPrefill | null }

export interface ReceivingPrefill {
  supplierCode: string
  partNumber: string
  supplierLot: string
  quantity: number | null
  orderNumber: string
}

export const receiveLotSchema = z.object({
  supplierCode: z.string().min(1, 'Choose the supplier.'),
  partNumber: z.string().min(1, 'Choose the part.'),
  supplierLot: trimmed(40).min(1, 'Type the lot number from the label.').regex(/^[^\p{Cc}]+$/u, 'Control characters are not allowed.'),
  quantity: z.number('Type how many motors came.').int('A whole number of motors.').min(1, 'At least one motor.').max(500_000, 'At most 500 000 motors.'),
  orderNumber: trimmed(40).default(''),
  unitPrice: z.number().min(0, 'Not below zero.').max(1_000_000).nullable().default(null),
  remarks: trimmed(2000).default(''),
  /** Serial numbers in the order of the delivery; empty: positions are drawn and serials bound later. */
  serials: z.array(trimmed(40).min(1)).max(500_000).default([]),
  /** Receipt number of the rejected lot that this one re-submits. */
  resubmissionOf: z.string().nullable().default(null),
})
export type ReceiveLot = z.input<typeof receiveLotSchema>

export const planPreviewSchema = receiveLotSchema.pick({ supplierCode: true, partNumber: true, quantity: true })
export interface PlanPreview {
  plan: SamplingPlan
  sheetVersion: number
  severityReason: string
}

export const lotParamsSchema = z.object({ number: z.string().max(40) })
export const motorParamsSchema = z.object({ number: z.string().max(40), serial: z.string().max(60) })
export const sampleParamsSchema = z.object({ number: z.string().max(40), drawOrder: z.coerce.number().int().min(1) })

export const bindSerialSchema = z.object({ serial: trimmed(40).min(1, 'Scan or type the serial number.') })

/** One file: its bytes are the body (application/octet-stream). */
export const uploadQuerySchema = z.object({
  name: z.string().min(1).max(200),
  rig: z.string().min(1, 'Choose the rig that measured.').max(40),
  /** Why the motor is measured again. */
  reason: z.string().trim().max(500).default(''),
})

export type UploadState = 'judged' | 'incomplete' | 'refused' | 'tray' | 'discarded'

/** What became of one file. */
export interface UploadAnswer {
  id: number
  name: string
  state: UploadState
  serial: string | null
  verdict: Verdict | null
  /** One sentence for people: the verdict with its figure, or what is missing. */
  sentence: string
  fault: Fault | null
  /** Set when a unit has to be named before this rig's files can be read. */
  recipe: ColumnRecipe | null
}

export const decisionSchema = z.object({
  password: z.string().min(1, 'Type your password to sign.').max(500),
  outcome: z.enum(['accepted', 'rejected']),
  /** Hash of the evidence that was on the screen. */
  evidenceHash: z.string().regex(/^[0-9a-f]{64}$/),
  /** Needed when rejecting against a computed acceptance. */
  reason: trimmed(1000).default(''),
})
export type Decision = z.input<typeof decisionSchema>

export interface DecisionAnswer {
  outcome: 'accepted' | 'rejected'
  paperNumber: string
  checkLink: string
}

/** A row of the Dock and of lists of lots. */
export interface LotSummary {
  number: string
  supplierLot: string
  supplier: string
  partNumber: string
  partName: string
  quantity: number
  state: LotState
  receivedAt: string
  sampleSize: number
  measured: number
  nonconforming: number
  paperNumber: string | null
}

export interface DockAnswer {
  /** Lots that wait for someone, oldest first. */
  waiting: LotSummary[]
  /** Decided within the last days. */
  decided: LotSummary[]
}

/** One drawn motor on the Lot page. */
export interface SampleTile {
  drawOrder: number
  position: number
  serial: string | null
  state: 'to-bind' | 'to-measure' | 'incomplete' | 'judged'
  verdict: Verdict | null
  /** N·m, for the figure under the ring. */
  peakToPeakNm: number | null
  /** Cogging over one turn, decimated for a small ring, N·m. */
  ring: number[] | null
  nonconformingClasses: NonconformityClass[]
  attempts: number
  warnings: number
}

export interface LotPage {
  number: string
  supplierLot: string
  supplier: string
  supplierCode: string
  part: { number: string; name: string; revision: string; design: MotorDesign; designOrder: number; ratedTorqueNm: number | null }
  quantity: number
  orderNumber: string
  remarks: string
  state: LotState
  receivedAt: string
  receivedBy: string
  sheetVersion: number
  severityReason: string
  plan: SamplingPlan
  drawSeed: string
  drawGenerator: string
  serialsListed: boolean
  resubmissionOf: string | null
  /** Limit of the cogging's peak to peak on this sheet, N·m. */
  limitPeakToPeakNm: number | null
  samples: SampleTile[]
  lotVerdict: LotVerdict
  /** Sentences on the likely origin of what fails. */
  explanation: string[]
  /** Files that wait: in the tray, or refused. */
  files: (UploadAnswer & { uploadedAt: string; rig: string })[]
  /** What the signer sees; the signature names its hash. */
  evidenceHash: string
  decision: { outcome: 'accepted' | 'rejected'; overruled: boolean; reason: string; signedBy: string; signedAt: string } | null
  paper: { number: string; state: string; checkLink: string; pdfReady: boolean } | null
  nonconformance: { number: string; state: string } | null
}

export interface AttemptView {
  id: number
  attempt: number
  verdict: Verdict | null
  counts: boolean
  measuredAt: string
  measuredBy: string
  reason: string
  voidReason: string | null
  rig: string
}

export interface MotorPage {
  lot: { number: string; supplierLot: string; supplier: string; partNumber: string; partName: string; sampleSize: number }
  serial: string
  drawOrder: number
  position: number
  designOrder: number
  verdict: Verdict | null
  limitPeakToPeakNm: number | null
  decisionRule: string
  sheetVersion: number
  engineVersion: string
  rig: { code: string; calibration: string; dueOn: string }
  measuredAt: string
  measuredBy: string
  turns: number
  rows: number
  highestOrder: number
  /** Over one turn, N·m. */
  coggingNm: number[]
  /** Odd part over one turn, N·m; null when one direction only. */
  frictionNm: number[] | null
  zeroNm: number
  directions: 'both' | 'forward' | 'reverse'
  orders: OrderAmplitude[]
  orderLimits: { order: number; upperNm: number }[]
  characteristics: CharacteristicVerdict[]
  /** Figures that the sheet does not limit. */
  unlimited: { key: string; value: number | null; unit: string; expandedUncertainty: number | null; notStated: string | null }[]
  explanation: string[]
  warnings: Warning[]
  files: { name: string; sha256: string; size: number }[]
  attempts: AttemptView[]
  previousSerial: string | null
  nextSerial: string | null
}

/** Query of the list of lots; the same words stand in the page's address. */
export const lotListSchema = z.object({
  text: z.string().trim().max(100).default(''),
  state: z.enum(['', 'waiting', 'accepted', 'rejected', 'closed']).catch(''),
  sort: z.enum(['receivedAt', 'supplierLot', 'supplier', 'part', 'state', 'quantity']).catch('receivedAt'),
  order: z.enum(['rising', 'falling']).catch('falling'),
  page: z.coerce.number().int().min(1).catch(1),
})
export interface LotListAnswer {
  rows: LotSummary[]
  total: number
  pageSize: number
}

export const assignUploadSchema = z.object({ serial: trimmed(40).min(1, 'Choose the motor.'), reason: trimmed(500).default('') })
export const reasonSchema = z.object({ reason: trimmed(500).min(3, 'Give the reason in a few words.') })
export const idParamsSchema = z.object({ id: z.coerce.number().int().min(1) })
export const fileParamsSchema = z.object({ sha256: z.string().regex(/^[0-9a-f]{64}$/, 'A file is named by 64 hexadecimal digits.') })
