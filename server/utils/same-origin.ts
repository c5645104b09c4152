import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { DomainError } from '../services/domain-error'

/**
 * Refuses changing requests that a page of another site sends: the browser names the page's origin, and it must be ours.
 * Programs that send neither header carry no cookie of a person either.
 */
export function checkSameOrigin(event: H3Event): void {
  if (event.method === 'GET' || event.method === 'HEAD') return
  const site = getRequestHeader(event, 'sec-fetch-site')
  if (site && site !== 'same-origin' && site !== 'none') throw foreign()
  const origin = getRequestHeader(event, 'origin')
  if (origin && new URL(origin).host !== getRequestHeader(event, 'host')) throw foreign()
}

function foreign(): DomainError {
  return new DomainError('forbidden', 'This request came from another site and was refused. Nothing was changed.')
}
