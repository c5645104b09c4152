import { rigParamsSchema } from '#shared/contracts/rigs'
import { getRigPage } from '../../../services/rigs/manage-rigs'

export default guardedRoute('GET /api/rigs/:code', {
  params: rigParamsSchema,
  handle: ({ context, params }) => getRigPage(context, params.code),
})
