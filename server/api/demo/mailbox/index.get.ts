import type { DemoMailboxAnswer } from '#shared/contracts/returns'
import { requireDemoMailbox } from '../../../utils/require-demo-mailbox'

export default publicRoute('GET /api/demo/mailbox', { handle: (): DemoMailboxAnswer => ({ messages: requireDemoMailbox().messages() }) })
