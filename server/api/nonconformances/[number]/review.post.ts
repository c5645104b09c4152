import { reviewSchema, nonconformanceParamsSchema } from '#shared/contracts/returns'
import { reviewAnswer } from '../../../services/returns/review-answer'

export default guardedRoute('POST /api/nonconformances/:number/review', {
  params: nonconformanceParamsSchema,
  body: reviewSchema,
  handle: ({ context, params, body }) => {
    reviewAnswer(context, params.number, body)
    return { done: true }
  },
})
