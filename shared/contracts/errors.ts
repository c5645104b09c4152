import { z } from 'zod'

/** Error codes and the HTTP status that each has. */
export const ERROR_STATUS = {
  'invalid-input': 400,
  'signed-out': 401,
  'wrong-password': 403,
  'forbidden': 403,
  'not-found': 404,
  'conflict': 409,
  'evidence-changed': 409,
  'too-large': 413,
  'refused': 422,
  'too-many-requests': 429,
  'internal': 500,
} as const

export type ErrorCode = keyof typeof ERROR_STATUS

export const fieldErrorSchema = z.object({ field: z.string(), message: z.string() })
export type FieldError = z.infer<typeof fieldErrorSchema>

/** The one shape of every error that the server answers with. */
export const errorResponseSchema = z.object({
  code: z.string(),
  message: z.string(),
  fields: z.array(fieldErrorSchema),
  /** Where to go instead, when there is such a page. */
  link: z.string().nullable(),
  requestId: z.string(),
})
export type ErrorResponse = z.infer<typeof errorResponseSchema>
