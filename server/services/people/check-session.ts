import { eq } from 'drizzle-orm'
import { people, sessions } from '../../database/schema/people'
import type { Actor, Services } from '../context'

/** Idle and absolute limits of a session, hours. */
export const SESSION_LIMITS = { idleHours: 12, absoluteHours: 7 * 24 } as const
const HOUR_MS = 3_600_000
/** How stale `seenAt` may get before it is written again. */
const SEEN_GRAIN_MS = 60_000

/**
 * The person of a session, or null when the session ended, is too old, idle too long, the password changed since, or the person was disabled.
 *
 * @param sessionId the random id that the cookie carries.
 */
export function checkSession(services: Pick<Services, 'db' | 'clock'>, sessionId: string): Actor | null {
  const row = services.db.select({ session: sessions, person: people }).from(sessions).innerJoin(people, eq(people.id, sessions.personId)).where(eq(sessions.id, sessionId)).get()
  if (!row) return null
  const { session, person } = row
  const time = services.clock().getTime()
  const live = !session.endedAt && !person.disabledAt
    && session.passwordVersion === person.passwordVersion
    && time - Date.parse(session.seenAt) < SESSION_LIMITS.idleHours * HOUR_MS
    && time - Date.parse(session.createdAt) < SESSION_LIMITS.absoluteHours * HOUR_MS
  if (!live) return null
  if (time - Date.parse(session.seenAt) > SEEN_GRAIN_MS) {
    services.db.update(sessions).set({ seenAt: services.clock().toISOString() }).where(eq(sessions.id, sessionId)).run()
  }
  return { personId: person.id, name: person.name, role: person.role, supplierId: person.supplierId }
}
