import { paperParamsSchema, withdrawPaperSchema } from '#shared/contracts/papers'
import { withdrawPaper } from '../../../services/papers/withdraw-paper'

export default guardedRoute('POST /api/papers/:number/withdrawal', {
  params: paperParamsSchema,
  body: withdrawPaperSchema,
  handle: async ({ context, params, body }) => {
    await withdrawPaper(context, params.number, body)
    return { done: true }
  },
})
