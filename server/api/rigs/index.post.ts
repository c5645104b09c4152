import { rigSchema } from '#shared/contracts/rigs'
import { addRig } from '../../services/rigs/manage-rigs'

export default guardedRoute('POST /api/rigs', {
  body: rigSchema,
  handle: ({ context, body }) => addRig(context, body),
})
