import { driftQuerySchema } from '#shared/contracts/drift'
import { getDrift } from '../../services/drift/drift-chart'

export default guardedRoute('GET /api/drift', { query: driftQuerySchema, handle: ({ context, query }) => getDrift(context, query) })
