import { signOut } from '../../services/people/sign-out'

export default guardedRoute('DELETE /api/session', {
  handle: async ({ context, event }) => {
    const session = await getUserSession(event)
    if (session.secure) signOut(context, session.secure.sessionId)
    await clearUserSession(event)
    return { done: true }
  },
})
