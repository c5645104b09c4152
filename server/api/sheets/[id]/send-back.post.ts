import { reasonSchema } from '#shared/contracts/lots'
import { sheetParamsSchema } from '#shared/contracts/parts'
import { sendSheetBack } from '../../../services/parts/sheet-life'

export default guardedRoute('POST /api/sheets/:id/send-back', {
  params: sheetParamsSchema,
  body: reasonSchema,
  handle: ({ context, params, body }) => {
    sendSheetBack(context, params.id, body.reason)
    return { done: true }
  },
})
