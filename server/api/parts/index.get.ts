import { listParts } from '../../services/parts/part-pages'

export default guardedRoute('GET /api/parts', {
  handle: ({ context }) => ({ rows: listParts(context) }),
})
