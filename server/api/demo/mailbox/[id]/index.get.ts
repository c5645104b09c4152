import { demoMailParamsSchema } from '#shared/contracts/returns'
import type { DemoMail } from '#shared/contracts/returns'
import { requireDemoMessage } from '../../../../utils/require-demo-mailbox'

export default publicRoute('GET /api/demo/mailbox/:id', {
  params: demoMailParamsSchema,
  handle: async ({ params }): Promise<DemoMail> => {
    const { files, ...message } = await requireDemoMessage(params.id)
    return { ...message, files: files.map(({ name, type, bytes }) => ({ name, type, size: bytes.length })) }
  },
})
