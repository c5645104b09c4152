import { z } from 'zod'
import { ROLES } from '../compute/terms/people'
import type { Role } from '../compute/terms/people'

export const signInSchema = z.object({
  email: z.string().trim().min(1, 'Type the address you sign in with.').max(200),
  password: z.string().min(1, 'Type your password.').max(500),
})

export const personSchema = z.object({
  id: z.number().int(),
  name: z.string(),
  role: z.enum(ROLES as [Role, ...Role[]]),
  /** Name of the supplier whose contact this is. */
  supplier: z.string().nullable(),
})
export type Person = z.infer<typeof personSchema>

export const sessionResponseSchema = z.object({
  person: personSchema.nullable(),
  /** IANA zone in which all times are shown. */
  timeZone: z.string(),
  plantName: z.string(),
  demo: z.boolean(),
})
export type SessionResponse = z.infer<typeof sessionResponseSchema>

/** What only a demo tells: whom to sign in as, and the labels to scan. */
export const demoResponseSchema = z.object({
  accounts: z.array(z.object({ name: z.string(), role: z.string(), email: z.string(), password: z.string() })),
  /** With the packing list (serial numbers) as a file. */
  labels: z.array(z.object({ title: z.string(), text: z.string(), packingList: z.string() })),
})
export type DemoResponse = z.infer<typeof demoResponseSchema>

export const packingListParamsSchema = z.object({ supplierLot: z.string().max(40) })
