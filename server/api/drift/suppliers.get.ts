import { getSupplierOverview } from '../../services/drift/supplier-overview'

export default guardedRoute('GET /api/drift/suppliers', { handle: ({ context }) => ({ rows: getSupplierOverview(context) }) })
