import { draftSheetSchema, sheetParamsSchema } from '#shared/contracts/parts'
import { saveDraft } from '../../../services/parts/sheet-life'

export default guardedRoute('PUT /api/sheets/:id', {
  params: sheetParamsSchema,
  body: draftSheetSchema,
  handle: ({ context, params, body }) => {
    saveDraft(context, params.id, body)
    return { done: true }
  },
})
