import { partParamsSchema } from '#shared/contracts/parts'
import { getPartPage } from '../../../services/parts/part-pages'

export default guardedRoute('GET /api/parts/:number', {
  params: partParamsSchema,
  handle: ({ context, params }) => getPartPage(context, params.number),
})
