import { paperParamsSchema } from '#shared/contracts/papers'
import { getPaperByNumber } from '../../../services/papers/find-paper'
import { sendPaperPdf } from '../../../utils/send-paper'

export default guardedRoute('GET /api/papers/:number/pdf', {
  params: paperParamsSchema,
  handle: ({ context, params, event }) => sendPaperPdf(event, context, getPaperByNumber(context, params.number)),
})
