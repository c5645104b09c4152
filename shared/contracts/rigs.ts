import { z } from 'zod'

export const rigParamsSchema = z.object({ code: z.string().max(40) })

const ROLES_OF_COLUMNS = ['angle', 'torque', 'current', 'voltage', 'duty', 'bus', 'time', 'speed', 'direction', 'temperature'] as const

/** What a person says about the columns of a rig's files. */
export const recipeSchema = z.object({
  version: z.number().int().min(0),
  columns: z.array(z.object({
    role: z.enum(ROLES_OF_COLUMNS),
    header: z.string().max(200).nullable(),
    index: z.number().int().min(0).max(1000),
    unit: z.string().max(40).nullable(),
  })).min(1).max(50),
})
export const confirmRecipeSchema = z.object({ recipe: recipeSchema })

export interface RigSummary {
  code: string
  name: string
  method: string
  location: string
  recipeConfirmed: boolean
  calibration: string | null
  dueOn: string | null
  usable: boolean
}

const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/, 'Choose a day.')
const small = (what: string) => z.number(`Type ${what}.`).min(0, 'Not below zero.').max(1000, 'Too large.')

export const rigSchema = z.object({
  code: z.string().trim().toUpperCase().min(1, 'Type the code.').max(20).regex(/^[A-Z0-9-]+$/, 'Letters, digits and - only.'),
  name: z.string().trim().min(1, 'Type the name.').max(100),
  method: z.enum(['torque-sensor', 'hold', 'spin']),
  location: z.string().trim().max(100).default(''),
  properties: z.object({
    rangeNm: z.number().positive('Above zero.').nullable(),
    torqueResolutionNm: small('the resolution of the torque'),
    torqueRelativeUncertainty: small('the relative uncertainty'),
    torqueAbsoluteUncertaintyNm: small('the absolute uncertainty'),
    angleResolutionRad: small('the resolution of the angle'),
    bandwidthHz: z.number().positive('Above zero.').nullable(),
  }),
})
export type RigInput = z.input<typeof rigSchema>

export const calibrationSchema = z.object({
  certificateNumber: z.string().trim().min(1, 'Type the certificate number.').max(60),
  laboratory: z.string().trim().min(1, 'Type the laboratory.').max(100),
  performedOn: day,
  dueOn: day,
  torqueRelativeUncertainty: small('the relative uncertainty').max(1, 'At most 1 (100 %).'),
  torqueAbsoluteUncertaintyNm: small('the absolute uncertainty'),
  remarks: z.string().trim().max(1000).default(''),
}).refine(row => row.performedOn < row.dueOn, { message: 'The due date must lie after the calibration.', path: ['dueOn'] })
export type CalibrationInput = z.input<typeof calibrationSchema>

export interface RigPage extends RigSummary {
  properties: z.output<typeof rigSchema>['properties']
  recipe: z.output<typeof recipeSchema> | null
  recipeConfirmedBy: string | null
  recipeConfirmedAt: string | null
  calibrations: { id: number; certificateNumber: string; laboratory: string; performedOn: string; dueOn: string; torqueRelativeUncertainty: number; torqueAbsoluteUncertaintyNm: number; remarks: string; enteredBy: string; enteredAt: string }[]
  /** Lots measured on this rig, newest first. */
  lots: { number: string; supplierLot: string; motors: number; lastMeasuredAt: string }[]
}
