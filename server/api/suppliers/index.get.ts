import { listSuppliers } from '../../services/parts/list-suppliers'

export default guardedRoute('GET /api/suppliers', { handle: ({ context }) => ({ suppliers: listSuppliers(context) }) })
