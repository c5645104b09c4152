import { rigParamsSchema, rigSchema } from '#shared/contracts/rigs'
import { changeRig } from '../../../services/rigs/manage-rigs'

export default guardedRoute('PUT /api/rigs/:code', {
  params: rigParamsSchema,
  body: rigSchema,
  handle: ({ context, params, body }) => changeRig(context, params.code, body),
})
