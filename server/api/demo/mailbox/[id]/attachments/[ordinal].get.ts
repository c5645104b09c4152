import { demoAttachmentParamsSchema } from '#shared/contracts/returns'
import { DomainError } from '../../../../../services/domain-error'
import { requireDemoMessage } from '../../../../../utils/require-demo-mailbox'
import { sendFile } from '../../../../../utils/send-file'

export default publicRoute('GET /api/demo/mailbox/:id/attachments/:ordinal', {
  params: demoAttachmentParamsSchema,
  handle: async ({ params, event }) => {
    const file = (await requireDemoMessage(params.id)).files[params.ordinal]
    if (!file) throw new DomainError('not-found', 'The message has no such attachment.')
    return sendFile(event, { name: file.name, bytes: file.bytes })
  },
})
