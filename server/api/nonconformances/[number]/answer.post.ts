import { answerSchema, nonconformanceParamsSchema } from '#shared/contracts/returns'
import { answerNonconformance } from '../../../services/returns/answer'

export default guardedRoute('POST /api/nonconformances/:number/answer', {
  params: nonconformanceParamsSchema,
  body: answerSchema,
  handle: ({ context, params, body }) => {
    answerNonconformance(context, params.number, body)
    return { done: true }
  },
})
