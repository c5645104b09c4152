import { partSchema } from '#shared/contracts/parts'
import { addPart } from '../../services/parts/manage-parts'

export default guardedRoute('POST /api/parts', {
  body: partSchema,
  handle: ({ context, body }) => addPart(context, body),
})
