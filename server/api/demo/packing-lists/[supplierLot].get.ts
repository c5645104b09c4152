import { packingListParamsSchema } from '#shared/contracts/session'
import { getPackingList } from '../../../services/demo/describe-demo'
import { sendFile } from '../../../utils/send-file'

export default guardedRoute('GET /api/demo/packing-lists/:supplierLot', {
  params: packingListParamsSchema,
  handle: ({ context, params, event }) => sendFile(event, { ...getPackingList(context, params.supplierLot), type: 'text/plain' }),
})
