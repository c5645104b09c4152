import { sheetParamsSchema, signedReasonSchema } from '#shared/contracts/parts'
import { retireSheet } from '../../../services/parts/sheet-life'

export default guardedRoute('POST /api/sheets/:id/retirement', {
  params: sheetParamsSchema,
  body: signedReasonSchema,
  handle: async ({ context, params, body }) => {
    await retireSheet(context, params.id, body)
    return { done: true }
  },
})
