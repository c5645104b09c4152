import { calibrationSchema, rigParamsSchema } from '#shared/contracts/rigs'
import { addCalibration } from '../../../services/rigs/manage-rigs'

export default guardedRoute('POST /api/rigs/:code/calibrations', {
  params: rigParamsSchema,
  body: calibrationSchema,
  handle: ({ context, params, body }) => {
    addCalibration(context, params.code, body)
    return { done: true }
  },
})
