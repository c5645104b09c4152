import { errorResponseSchema } from '#shared/contracts/errors'
import type { ErrorResponse } from '#shared/contracts/errors'

/** What went wrong, in the server's own words where it has any. */
export function readApiError(error: unknown): ErrorResponse {
  const data = typeof error === 'object' && error !== null && 'data' in error ? error.data : null
  const parsed = errorResponseSchema.safeParse(data)
  if (parsed.success) return parsed.data
  return { code: 'no-answer', message: 'The server could not be reached. Nothing was changed; check the network and try again.', fields: [], link: null, requestId: '' }
}

/** The message that belongs to a field of a form; null: none. */
export function fieldMessage(error: ErrorResponse | null, field: string): string | null {
  return error?.fields.find(row => row.field === field)?.message ?? null
}
