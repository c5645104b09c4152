import { fileParamsSchema } from '#shared/contracts/lots'
import { getRawFile } from '../../services/measuring/get-raw-file'
import { sendFile } from '../../utils/send-file'

export default guardedRoute('GET /api/files/:sha256', {
  params: fileParamsSchema,
  handle: async ({ context, params, event }) => sendFile(event, await getRawFile(context, params.sha256)),
})
