import { paperListSchema } from '#shared/contracts/papers'
import { listPapers } from '../../services/papers/find-paper'

export default guardedRoute('GET /api/papers', { query: paperListSchema, handle: ({ context, query }) => listPapers(context, query) })
