import { receiveLotSchema } from '#shared/contracts/lots'
import { receiveLot } from '../../services/lots/receive-lot'

export default guardedRoute('POST /api/lots', { body: receiveLotSchema, handle: ({ context, body }) => receiveLot(context, body) })
