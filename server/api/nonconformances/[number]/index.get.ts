import { nonconformanceParamsSchema } from '#shared/contracts/returns'
import { getNonconformancePage } from '../../../services/returns/nonconformance-page'

export default guardedRoute('GET /api/nonconformances/:number', { params: nonconformanceParamsSchema, handle: ({ context, params }) => getNonconformancePage(context, params.number) })
