import { z } from 'zod'
import { isCharacteristicKey } from '../compute/judging/characteristics'
import { AQL_VALUES, INSPECTION_LEVELS, LARGEST_AQL_OF_NONCONFORMING_ITEMS } from '../compute/sampling/tables'
import type { InspectionLevel, LimitSheetContent } from '../compute/terms/judgement'
import type { MotorDesign } from '../compute/terms/motor'
import type { LimitSheetState } from '../compute/lifecycle/limit-sheet'

const positive = (what: string) => z.number(`Type ${what}.`).positive('Above zero.').max(1e6, 'Too large.')
const count = (what: string, least: number, most: number) => z.number(`Type ${what}.`).int('A whole number.').min(least, `At least ${least}.`).max(most, `At most ${most}.`)

export const motorDesignSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('brushless'), slots: count('the number of slots', 3, 120), poles: count('the number of poles', 2, 120).refine(value => value % 2 === 0, 'Poles come in pairs: an even number.') }),
  z.object({ kind: z.literal('claw-pole stepper'), polePairs: count('the number of pole pairs', 1, 100) }),
  z.object({ kind: z.literal('hybrid stepper'), rotorTeeth: count('the number of rotor teeth', 4, 200) }),
]) satisfies z.ZodType<MotorDesign>

export const partSchema = z.object({
  number: z.string().trim().min(1, 'Type the part number.').max(40).regex(/^[\w.\-/ ]+$/, 'Letters, digits, and . - / only.'),
  name: z.string().trim().min(1, 'Type the name.').max(100),
  revision: z.string().trim().max(20).default(''),
  design: motorDesignSchema,
  ratedTorqueNm: positive('the rated torque').nullable().default(null),
  torqueConstantNmPerA: positive('the torque constant').nullable().default(null),
  phaseResistanceOhm: positive('the phase resistance').nullable().default(null),
  rotorInertiaKgM2: positive('the rotor inertia').nullable().default(null),
  suppliers: z.array(z.object({
    code: z.string().min(1).max(40),
    supplierPartNumber: z.string().trim().max(40).default(''),
    unitPrice: z.number().min(0, 'Not below zero.').max(1e6).nullable().default(null),
  })).max(50).default([]),
})
export type PartInput = z.input<typeof partSchema>

const limitSchema = z.object({
  key: z.string().refine(isCharacteristicKey, 'Choose a characteristic.'),
  lower: z.number().finite().nullable(),
  upper: z.number().finite().nullable(),
  unit: z.enum(['N·m', '%', '1', 'rad']),
  class: z.enum(['critical', 'major', 'minor']),
}).refine(limit => limit.lower !== null || limit.upper !== null, { message: 'Type a lower or an upper limit.', path: ['upper'] })
  .refine(limit => limit.lower === null || limit.upper === null || limit.lower < limit.upper, { message: 'The lower limit must be below the upper one.', path: ['lower'] })

const aqlSchema = z.enum(AQL_VALUES as unknown as [string, ...string[]], 'Choose an AQL of the table.')
  .refine(value => Number(value) <= LARGEST_AQL_OF_NONCONFORMING_ITEMS, `At most ${LARGEST_AQL_OF_NONCONFORMING_ITEMS}: larger ones count defects per hundred, not motors.`)

const samplingSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('attributes'),
    level: z.enum(INSPECTION_LEVELS as [InspectionLevel, ...InspectionLevel[]]),
    aql: z.object({ critical: aqlSchema, major: aqlSchema, minor: aqlSchema }).partial(),
  }),
  z.object({ kind: z.literal('zero-acceptance'), limitingQualityPercent: z.number().gt(0, 'Above zero.').lt(100, 'Below 100.'), consumerRisk: z.number().gt(0, 'Above zero.').lt(0.5, 'Below 0.5.') }),
  z.object({ kind: z.literal('every') }),
  z.object({ kind: z.literal('fixed'), n: count('how many motors are drawn', 1, 500_000) }),
])

const ratio = z.number().gt(0, 'Above zero.').max(2, 'At most 2.')

/** What a limit sheet holds; the same schema checks the form and the route. */
export const sheetContentSchema = z.object({
  rippleDefinition: z.enum(['peakToPeakOverRated', 'halfPeakToPeakOverRated', 'rmsOverRated', 'peakToPeakOverMean', 'halfPeakToPeakOverMean', 'maxMinusMinOverMaxPlusMin', 'largestDeviationOverMean', 'rmsOverMean']),
  highestOrder: count('the highest order', 4, 1000).nullable(),
  limits: z.array(limitSchema).min(1, 'A sheet needs at least one limit.').max(200),
  decisionRule: z.discriminatedUnion('kind', [z.object({ kind: z.literal('simple') }), z.object({ kind: z.literal('guard-band'), ratio }), z.object({ kind: z.literal('four-way'), ratio })]),
  sampling: samplingSchema,
  requires: z.object({ bothDirections: z.boolean(), temperature: z.boolean() }),
  compensation: z.object({ entries: count('the number of entries', 8, 65536), stepNm: z.number().positive('Above zero.') }).nullable(),
}).superRefine((sheet, context) => {
  const seen = new Set<string>()
  sheet.limits.forEach((limit, index) => {
    const at = (field: string, message: string) => context.addIssue({ code: 'custom', path: ['limits', index, field], message })
    if (seen.has(limit.key)) at('key', 'This characteristic stands in the sheet already.')
    seen.add(limit.key)
    const order = /^order\.(\d+)$/.exec(limit.key)
    if (order && sheet.highestOrder !== null && Number(order[1]) > sheet.highestOrder) at('key', `Order ${order[1]} is above the highest order analysed, ${sheet.highestOrder}.`)
    if (limit.key.startsWith('friction.') && !sheet.requires.bothDirections) at('key', 'Friction can be judged only when both directions are demanded.')
    if (limit.key.startsWith('afterCompensation.') && !sheet.compensation) at('key', 'Give the table entries and the torque step of the drive first.')
    if (sheet.sampling.kind === 'attributes' && !sheet.sampling.aql[limit.class]) at('class', `The class ${limit.class} has no AQL in this sheet.`)
  })
}) satisfies z.ZodType<LimitSheetContent>

export const partParamsSchema = z.object({ number: z.string().max(40) })
export const sheetParamsSchema = z.object({ id: z.coerce.number().int().min(1) })
export const draftSheetSchema = z.object({ content: sheetContentSchema, reason: z.string().trim().max(1000).default('') })
export const signedReasonSchema = z.object({ password: z.string().min(1, 'Type your password to sign.').max(500), reason: z.string().trim().min(3, 'Give the reason in a few words.').max(1000) })
export const approveSheetSchema = signedReasonSchema.extend({ effectiveFrom: z.string().regex(/^\d{4}-\d{2}-\d{2}$/, 'Choose the day from which it holds.') })

export interface SheetView {
  id: number
  version: number
  state: LimitSheetState
  content: LimitSheetContent
  reason: string
  author: string
  authorId: number
  createdAt: string
  submittedAt: string | null
  approvedBy: string | null
  approvedAt: string | null
  approvalReason: string | null
  effectiveFrom: string | null
  retiredAt: string | null
  /** The approved sheet that lots received now are judged by. */
  inForce: boolean
  /** What changed against the version before, in words. */
  changes: string[]
}

export interface PartRow {
  number: string
  name: string
  revision: string
  design: MotorDesign
  designOrder: number
  ratedTorqueNm: number | null
  suppliers: string[]
  sheetInForce: number | null
  drafts: number
}

export interface PartPage extends PartRow {
  torqueConstantNmPerA: number | null
  phaseResistanceOhm: number | null
  rotorInertiaKgM2: number | null
  deliveredBy: { code: string; name: string; supplierPartNumber: string; unitPrice: number | null }[]
  sheets: SheetView[]
}
