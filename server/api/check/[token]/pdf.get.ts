import { tokenParamsSchema } from '#shared/contracts/papers'
import { getPaperByToken } from '../../../services/papers/find-paper'
import { sendPaperPdf } from '../../../utils/send-paper'

export default publicRoute('GET /api/check/:token/pdf', {
  params: tokenParamsSchema,
  handle: ({ services, params, event }) => sendPaperPdf(event, services, getPaperByToken(services, params.token)),
})
