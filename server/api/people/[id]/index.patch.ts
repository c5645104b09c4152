import { changePersonSchema, personParamsSchema } from '#shared/contracts/people'
import { changePerson } from '../../../services/people/manage-people'

export default guardedRoute('PATCH /api/people/:id', {
  params: personParamsSchema,
  body: changePersonSchema,
  handle: ({ context, params, body }) => {
    changePerson(context, params.id, body)
    return { done: true }
  },
})
