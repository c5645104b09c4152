import { z } from 'zod'

export const logbookListSchema = z.object({
  action: z.string().trim().max(60).default(''),
  subjectKind: z.string().trim().max(40).default(''),
  subjectId: z.string().trim().max(60).default(''),
  actor: z.coerce.number().int().min(1).optional().catch(undefined),
  from: z.string().regex(/^\d{4}-\d{2}-\d{2}$/).optional().catch(undefined),
  to: z.string().regex(/^\d{4}-\d{2}-\d{2}$/).optional().catch(undefined),
  order: z.enum(['rising', 'falling']).catch('falling'),
  page: z.coerce.number().int().min(1).catch(1),
})

export interface LogbookRow {
  sequence: number
  at: string
  actor: string | null
  action: string
  subjectKind: string
  subjectId: string
  /** Page of the subject, when it has one. */
  link: string | null
  content: Record<string, unknown>
  entryHash: string
}
export interface LogbookListAnswer {
  rows: LogbookRow[]
  total: number
  pageSize: number
  /** Everything that can be filtered by. */
  actions: string[]
  subjectKinds: string[]
}

export interface LogbookCheck {
  ok: boolean
  entries: number
  headHash: string
  /** First entry that does not fit, and why. */
  problem: { sequence: number; sentence: string } | null
}
