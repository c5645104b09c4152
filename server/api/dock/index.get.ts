import { listDock } from '../../services/lots/list-dock'

export default guardedRoute('GET /api/dock', { handle: ({ context }) => listDock(context) })
