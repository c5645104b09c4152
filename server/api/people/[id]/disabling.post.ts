import { personParamsSchema } from '#shared/contracts/people'
import { setPersonDisabled } from '../../../services/people/manage-people'

export default guardedRoute('POST /api/people/:id/disabling', {
  params: personParamsSchema,
  handle: ({ context, params }) => {
    setPersonDisabled(context, params.id, true)
    return { done: true }
  },
})
