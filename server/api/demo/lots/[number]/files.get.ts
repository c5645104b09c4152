import { lotParamsSchema } from '#shared/contracts/lots'
import { getDemoFiles } from '../../../../services/demo/demo-files'
import { sendFile } from '../../../../utils/send-file'

export default guardedRoute('GET /api/demo/lots/:number/files', {
  params: lotParamsSchema,
  handle: ({ context, params, event }) => sendFile(event, { ...getDemoFiles(context, params.number), type: 'application/zip' }),
})
