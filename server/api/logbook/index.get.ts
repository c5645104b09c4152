import { logbookListSchema } from '#shared/contracts/logbook'
import { listLogbook } from '../../services/logbook/list-logbook'

export default guardedRoute('GET /api/logbook', { query: logbookListSchema, handle: ({ context, query }) => listLogbook(context, query) })
