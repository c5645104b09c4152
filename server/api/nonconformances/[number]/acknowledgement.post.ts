import { nonconformanceParamsSchema } from '#shared/contracts/returns'
import { acknowledgeNonconformance } from '../../../services/returns/acknowledge'

export default guardedRoute('POST /api/nonconformances/:number/acknowledgement', {
  params: nonconformanceParamsSchema,
  handle: ({ context, params }) => acknowledgeNonconformance(context, params.number),
})
