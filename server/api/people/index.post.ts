import { addPersonSchema } from '#shared/contracts/people'
import { addPerson } from '../../services/people/manage-people'

export default guardedRoute('POST /api/people', { body: addPersonSchema, handle: ({ context, body }) => addPerson(context, body) })
