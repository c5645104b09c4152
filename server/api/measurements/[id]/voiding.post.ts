import { idParamsSchema, reasonSchema } from '#shared/contracts/lots'
import { voidMeasurement } from '../../../services/measuring/void-measurement'

export default guardedRoute('POST /api/measurements/:id/voiding', {
  params: idParamsSchema,
  body: reasonSchema,
  handle: ({ context, params, body }) => {
    voidMeasurement(context, { ...params, ...body })
    return { done: true }
  },
})
