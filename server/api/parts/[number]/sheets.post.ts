import { partParamsSchema } from '#shared/contracts/parts'
import { draftSheet } from '../../../services/parts/sheet-life'

export default guardedRoute('POST /api/parts/:number/sheets', {
  params: partParamsSchema,
  handle: ({ context, params }) => draftSheet(context, params.number),
})
