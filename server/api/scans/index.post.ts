import { scanSchema } from '#shared/contracts/lots'
import { scan } from '../../services/lots/scan'

export default guardedRoute('POST /api/scans', { body: scanSchema, handle: ({ context, body }) => scan(context, body.text) })
