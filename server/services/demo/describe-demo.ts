import type { DemoResponse } from '#shared/contracts/session'
import { DEMO_PASSWORD, scenario } from '../../database/seed/scenario'
import type { Services } from '../context'
import { DomainError } from '../domain-error'

/** The demo's accounts and the labels to scan; outside a demo there is no such thing. */
export function describeDemo(services: Pick<Services, 'settings'>): DemoResponse {
  if (!services.settings.demo) throw new DomainError('not-found', 'This is not a demo.')
  return { accounts: [], labels: [] }
}
