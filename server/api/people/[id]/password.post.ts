import { personParamsSchema, resetPasswordSchema } from '#shared/contracts/people'
import { resetPassword } from '../../../services/people/manage-people'

export default guardedRoute('POST /api/people/:id/password', {
  params: personParamsSchema,
  body: resetPasswordSchema,
  handle: async ({ context, params, body }) => {
    await resetPassword(context, params.id, body.password)
    return { done: true }
  },
})
