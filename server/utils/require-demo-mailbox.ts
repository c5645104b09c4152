import { DomainError } from '../services/domain-error'
import type { DemoMailServer } from '../mail/demo-server'
import { getDemoMailbox } from './demo-mailbox'

/** The demo's mail server; outside a demo the routes to it answer as if they did not exist. */
export function requireDemoMailbox(): DemoMailServer {
  const mailbox = getDemoMailbox()
  if (!mailbox) throw new DomainError('not-found', 'There is no such page. A mailbox exists in a demo only.')
  return mailbox
}

/** @throws DomainError `not-found`. */
export async function requireDemoMessage(id: string) {
  const message = await requireDemoMailbox().message(id)
  if (!message) throw new DomainError('not-found', 'There is no such message. It may have made room for newer ones.')
  return message
}
