import { closingSchema, nonconformanceParamsSchema } from '#shared/contracts/returns'
import { closeNonconformance } from '../../../services/returns/close-nonconformance'

export default guardedRoute('POST /api/nonconformances/:number/closing', {
  params: nonconformanceParamsSchema,
  body: closingSchema,
  handle: ({ context, params, body }) => {
    closeNonconformance(context, params.number, body.reason)
    return { done: true }
  },
})
