import { z } from 'zod'
import { ROLES } from '../compute/terms/people'
import type { Role } from '../compute/terms/people'

const roleSchema = z.enum(ROLES as [Role, ...Role[]])
/** One address, nothing that a mail header could be broken with. */
export const emailSchema = z.string().trim().toLowerCase().max(200).regex(/^[^\s@<>,;:"()[\]\\]+@[^\s@<>,;:"()[\]\\]+\.[^\s@<>,;:"()[\]\\]+$/, 'Type one address, like name@company.example.')
export const newPasswordSchema = z.string().min(12, 'At least 12 characters.').max(500)

export const personInputSchema = z.object({
  name: z.string().trim().min(1, 'Type the name.').max(100).regex(/^[^\p{Cc}]+$/u, 'Control characters are not allowed.'),
  email: emailSchema,
  role: roleSchema,
  /** Code of the supplier; for the role supplier only. */
  supplierCode: z.string().max(40).nullable().default(null),
  /** 1: gets notices first, 2: when they go unanswered. */
  noticeRank: z.number().int().min(1).max(2).nullable().default(null),
})
export type PersonInput = z.input<typeof personInputSchema>

export const addPersonSchema = personInputSchema.extend({ password: newPasswordSchema })
export const changePersonSchema = personInputSchema.partial({ email: true })
export const resetPasswordSchema = z.object({ password: newPasswordSchema })
export const personParamsSchema = z.object({ id: z.coerce.number().int().min(1) })

export const peopleListSchema = z.object({
  text: z.string().trim().max(100).default(''),
  role: z.enum(['', ...ROLES]).catch(''),
  sort: z.enum(['name', 'email', 'role', 'createdAt']).catch('name'),
  order: z.enum(['rising', 'falling']).catch('rising'),
  page: z.coerce.number().int().min(1).catch(1),
})

export interface PersonRow {
  id: number
  name: string
  email: string
  role: Role
  supplierCode: string | null
  supplier: string | null
  noticeRank: number | null
  disabledAt: string | null
  createdAt: string
  lastSeenAt: string | null
}
export interface PeopleListAnswer { rows: PersonRow[]; total: number; pageSize: number }
