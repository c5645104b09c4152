import { decisionSchema, lotParamsSchema } from '#shared/contracts/lots'
import { decideLot } from '../../../services/lots/decide-lot'

export default guardedRoute('POST /api/lots/:number/decision', {
  params: lotParamsSchema,
  body: decisionSchema,
  handle: ({ context, params, body }) => decideLot(context, params.number, body),
})
