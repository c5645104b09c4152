import { assignUploadSchema, idParamsSchema } from '#shared/contracts/lots'
import { assignUpload } from '../../../services/measuring/tray'

export default guardedRoute('POST /api/uploads/:id/assignment', {
  params: idParamsSchema,
  body: assignUploadSchema,
  handle: ({ context, params, body }) => assignUpload(context, { ...params, ...body }),
})
