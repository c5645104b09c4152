import { getCookie } from 'h3'
import type { H3Event } from 'h3'
import { checkSession } from '../services/people/check-session'
import type { Actor, Services } from '../services/context'

/** The person behind the request: the sealed cookie names a session row, which is checked every time. */
export async function findActor(event: H3Event, services: Services): Promise<Actor | null> {
  // Asking for the session of a visitor would hand out an empty one as a cookie.
  if (!getCookie(event, useRuntimeConfig(event).session.name ?? 'nuxt-session')) return null
  const session = await getUserSession(event)
  const id = session.secure?.sessionId
  return typeof id === 'string' ? checkSession(services, id) : null
}
