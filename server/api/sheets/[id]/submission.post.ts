import { sheetParamsSchema } from '#shared/contracts/parts'
import { submitSheet } from '../../../services/parts/sheet-life'

export default guardedRoute('POST /api/sheets/:id/submission', {
  params: sheetParamsSchema,
  handle: ({ context, params }) => {
    submitSheet(context, params.id)
    return { done: true }
  },
})
