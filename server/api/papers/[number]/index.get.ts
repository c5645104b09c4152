import { paperParamsSchema } from '#shared/contracts/papers'
import { getPaperPage } from '../../../services/papers/find-paper'

export default guardedRoute('GET /api/papers/:number', { params: paperParamsSchema, handle: ({ context, params }) => getPaperPage(context, params.number) })
