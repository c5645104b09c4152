import { getRequestIP } from 'h3'
import { signInSchema } from '#shared/contracts/session'
import { describePerson } from '../../services/people/describe-person'
import { signIn } from '../../services/people/sign-in'

export default publicRoute('POST /api/session', {
  body: signInSchema,
  handle: async ({ services, body, event }) => {
    const { sessionId, actor } = await signIn(services, { ...body, address: getRequestIP(event) ?? 'unknown' })
    await replaceUserSession(event, { secure: { sessionId } })
    return { person: describePerson(services, actor) }
  },
})
