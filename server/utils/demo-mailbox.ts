import type { DemoMailServer } from '../mail/demo-server'

let mailbox: DemoMailServer | null = null

export function setDemoMailbox(server: DemoMailServer | null): void {
  mailbox = server
}

/** The demo's own mail server; null outside a demo. */
export function getDemoMailbox(): DemoMailServer | null {
  return mailbox
}
