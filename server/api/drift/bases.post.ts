import { freezeBaseSchema } from '#shared/contracts/drift'
import { freezeBase } from '../../services/drift/freeze-base'

export default guardedRoute('POST /api/drift/bases', { body: freezeBaseSchema, handle: ({ context, body }) => freezeBase(context, body) })
