import { lotParamsSchema, uploadQuerySchema } from '#shared/contracts/lots'
import { recordUpload } from '../../../services/measuring/record-upload'
import { readFileBody } from '../../../utils/file-body'

export default guardedRoute('POST /api/lots/:number/uploads', {
  params: lotParamsSchema,
  query: uploadQuerySchema,
  handle: async ({ context, params, query, event }) => {
    const bytes = await readFileBody(event)
    return recordUpload(context, { lotNumber: params.number, name: query.name, rigCode: query.rig, reason: query.reason, bytes })
  },
})
