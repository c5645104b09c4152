import { motorParamsSchema } from '#shared/contracts/lots'
import { getMotorPage } from '../../../../services/lots/motor-page'

export default guardedRoute('GET /api/lots/:number/motors/:serial', { params: motorParamsSchema, handle: ({ context, params }) => getMotorPage(context, params.number, params.serial) })
