import { nonconformanceListSchema } from '#shared/contracts/returns'
import { listNonconformances } from '../../services/returns/list-nonconformances'

export default guardedRoute('GET /api/nonconformances', { query: nonconformanceListSchema, handle: ({ context, query }) => listNonconformances(context, query) })
