import { bindSerialSchema, sampleParamsSchema } from '#shared/contracts/lots'
import { bindSerial } from '../../../../../services/lots/bind-serial'

export default guardedRoute('POST /api/lots/:number/samples/:drawOrder/serial', {
  params: sampleParamsSchema,
  body: bindSerialSchema,
  handle: ({ context, params, body }) => {
    bindSerial(context, { lotNumber: params.number, drawOrder: params.drawOrder, serial: body.serial })
    return { done: true }
  },
})
