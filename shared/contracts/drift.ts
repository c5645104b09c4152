import { z } from 'zod'

export const driftQuerySchema = z.object({
  supplier: z.string().max(40).default(''),
  part: z.string().max(40).default(''),
  key: z.string().max(60).default('cogging.peakToPeak'),
})
export const freezeBaseSchema = z.object({
  supplier: z.string().min(1, 'Choose the supplier.').max(40),
  part: z.string().min(1, 'Choose the part.').max(40),
  key: z.string().min(1).max(60),
  fromDate: z.string().regex(/^\d{4}-\d{2}-\d{2}$/, 'Choose the first day of the base period.'),
  toDate: z.string().regex(/^\d{4}-\d{2}-\d{2}$/, 'Choose the last day of the base period.'),
  reason: z.string().trim().min(3, 'Give the reason in a few words.').max(500),
}).refine(base => base.fromDate <= base.toDate, { message: 'The last day lies before the first.', path: ['toDate'] })

/** One lot on the chart of individuals. */
export interface DriftPoint {
  lotNumber: string
  supplierLot: string
  receivedAt: string
  /** Mean over the lot's counted measurements, in `unit`. */
  mean: number
  motors: number
  movingRange: number | null
  outcome: 'accepted' | 'rejected' | null
  /** Outside the control limits. */
  signal: boolean
  inBase: boolean
}

export interface DriftChart {
  supplier: string
  supplierName: string
  part: string
  partName: string
  key: string
  label: string
  unit: string
  points: DriftPoint[]
  /** null while fewer than two lots lie in the base period. */
  limits: { centre: number; lower: number; upper: number; sigma: number; movingRangeCentre: number; movingRangeUpper: number } | null
  base: { version: number; fromDate: string; toDate: string; frozenBy: string; frozenAt: string; reason: string } | null
  /** What is in use when no base is frozen. */
  baseSentence: string
  sheetLimit: { lower: number | null; upper: number | null } | null
  /** What the chart says, in words. */
  summary: string
}

export interface DriftChoice { supplier: string; supplierName: string; part: string; partName: string; lots: number }
export interface DriftAnswer {
  choices: DriftChoice[]
  keys: { key: string; label: string }[]
  chart: DriftChart | null
}

export interface SupplierOverviewRow {
  code: string
  name: string
  lots: number
  accepted: number
  rejected: number
  motorsMeasured: number
  motorsNonconforming: number
  openNonconformances: number
  /** Mean days from notice to acknowledgement; null when none yet. */
  daysToAcknowledge: number | null
  lastLotAt: string | null
}
