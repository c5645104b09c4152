import { messageSchema, nonconformanceParamsSchema } from '#shared/contracts/returns'
import { addMessage } from '../../../services/returns/add-message'

export default guardedRoute('POST /api/nonconformances/:number/messages', {
  params: nonconformanceParamsSchema,
  body: messageSchema,
  handle: ({ context, params, body }) => {
    addMessage(context, params.number, body.text)
    return { done: true }
  },
})
