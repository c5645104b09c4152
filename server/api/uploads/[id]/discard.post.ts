import { idParamsSchema, reasonSchema } from '#shared/contracts/lots'
import { discardUpload } from '../../../services/measuring/tray'

export default guardedRoute('POST /api/uploads/:id/discard', {
  params: idParamsSchema,
  body: reasonSchema,
  handle: ({ context, params, body }) => {
    discardUpload(context, { ...params, ...body })
    return { done: true }
  },
})
