import { lotParamsSchema } from '#shared/contracts/lots'
import { getLotPage } from '../../../services/lots/lot-page'

export default guardedRoute('GET /api/lots/:number', { params: lotParamsSchema, handle: ({ context, params }) => getLotPage(context, params.number) })
