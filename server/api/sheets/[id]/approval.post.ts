import { approveSheetSchema, sheetParamsSchema } from '#shared/contracts/parts'
import { approveSheet } from '../../../services/parts/sheet-life'

export default guardedRoute('POST /api/sheets/:id/approval', {
  params: sheetParamsSchema,
  body: approveSheetSchema,
  handle: async ({ context, params, body }) => {
    await approveSheet(context, params.id, body)
    return { done: true }
  },
})
