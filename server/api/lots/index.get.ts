import { lotListSchema } from '#shared/contracts/lots'
import { listLots } from '../../services/lots/list-lots'

export default guardedRoute('GET /api/lots', { query: lotListSchema, handle: ({ context, query }) => listLots(context, query) })
