import type { ErrorCode, FieldError } from '#shared/contracts/errors'

/** The one error that services throw: its message is safe and meant for people. */
export class DomainError extends Error {
  constructor(
    readonly code: ErrorCode,
    message: string,
    readonly details: { fields?: FieldError[]; link?: string } = {},
  ) {
    super(message)
    this.name = 'DomainError'
  }
}
