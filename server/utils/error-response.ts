import { setResponseHeader, setResponseStatus } from 'h3'
import type { H3Event } from 'h3'
import { ZodError } from 'zod'
import { ERROR_STATUS } from '#shared/contracts/errors'
import type { ErrorCode, ErrorResponse } from '#shared/contracts/errors'
import { DomainError } from '../services/domain-error'

/** Maps any error to the one shape and its status; what is unforeseen is logged and told without details. */
export function answerWithError(event: H3Event, error: unknown): ErrorResponse {
  const requestId = String(event.context.requestId ?? '')
  const { code, message, fields, link } = describe(error)
  if (code === 'internal') console.error(`[${requestId}] ${event.method} ${event.path}`, error)
  setResponseStatus(event, ERROR_STATUS[code])
  setResponseHeader(event, 'cache-control', 'no-store')
  return { code, message, fields, link, requestId }
}

function describe(error: unknown): { code: ErrorCode } & Pick<ErrorResponse, 'message' | 'fields' | 'link'> {
  if (error instanceof DomainError) return { code: error.code, message: error.message, fields: error.details.fields ?? [], link: error.details.link ?? null }
  if (error instanceof ZodError) {
    const fields = error.issues.map(issue => ({ field: issue.path.join('.'), message: issue.message }))
    return { code: 'invalid-input', message: 'Some of what was sent cannot be used. Nothing was changed.', fields, link: null }
  }
  return { code: 'internal', message: 'Something went wrong here. Nothing was changed; try again, and tell the administrator the request number if it happens again.', fields: [], link: null }
}
