import { tokenParamsSchema } from '#shared/contracts/papers'
import { describePaper, getPaperByToken } from '../../../services/papers/find-paper'

export default publicRoute('GET /api/check/:token', { params: tokenParamsSchema, handle: ({ services, params }) => describePaper(services, getPaperByToken(services, params.token)) })
