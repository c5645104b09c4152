import { dispositionSchema, nonconformanceParamsSchema } from '#shared/contracts/returns'
import { decideDisposition } from '../../../services/returns/disposition'

export default guardedRoute('POST /api/nonconformances/:number/disposition', {
  params: nonconformanceParamsSchema,
  body: dispositionSchema,
  handle: async ({ context, params, body }) => {
    await decideDisposition(context, params.number, body)
    return { done: true }
  },
})
