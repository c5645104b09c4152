import { tokenFileParamsSchema } from '#shared/contracts/papers'
import { getPaperByToken, getPaperFile } from '../../../../services/papers/find-paper'
import { sendFile } from '../../../../utils/send-file'

export default publicRoute('GET /api/check/:token/files/:sha256', {
  params: tokenFileParamsSchema,
  handle: async ({ services, params, event }) => sendFile(event, await getPaperFile(services, getPaperByToken(services, params.token), params.sha256)),
})
