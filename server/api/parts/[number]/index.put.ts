import { partParamsSchema, partSchema } from '#shared/contracts/parts'
import { changePart } from '../../../services/parts/manage-parts'

export default guardedRoute('PUT /api/parts/:number', {
  params: partParamsSchema,
  body: partSchema,
  handle: ({ context, params, body }) => changePart(context, params.number, body),
})
