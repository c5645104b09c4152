import { listRigs } from '../../services/rigs/list-rigs'

export default guardedRoute('GET /api/rigs', { handle: ({ context }) => ({ rigs: listRigs(context) }) })
