import { peopleListSchema } from '#shared/contracts/people'
import { listPeople } from '../../services/people/list-people'

export default guardedRoute('GET /api/people', { query: peopleListSchema, handle: ({ context, query }) => listPeople(context, query) })
