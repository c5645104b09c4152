import { eq } from 'drizzle-orm'
import { sessions } from '../../database/schema/people'
import { now } from '../context'
import type { Context } from '../context'
import { appendToLogbook } from '../logbook/append'

/** Ends a session for good. */
export function signOut(context: Context, sessionId: string): void {
  context.db.transaction((tx) => {
    tx.update(sessions).set({ endedAt: now(context) }).where(eq(sessions.id, sessionId)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'session.ended', subjectKind: 'person', subjectId: context.actor.personId })
  }, { behavior: 'immediate' })
}
