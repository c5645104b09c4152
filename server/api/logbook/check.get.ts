import { checkLogbook } from '../../services/logbook/check-logbook'

export default guardedRoute('GET /api/logbook/check', { handle: ({ context }) => checkLogbook(context.db) })
