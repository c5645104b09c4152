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
