import { eq, inArray } from 'drizzle-orm'
import { people, sessions, signInFailures } from '../../database/schema/people'
import { now, randomHex } from '../context'
import type { Actor, Services } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'

/** Failed tries that are free; from then on each one doubles the wait. */
const FREE_TRIES = 5
const FIRST_WAIT_MS = 5_000
const LONGEST_WAIT_MS = 15 * 60_000
/** A hash of nothing that anyone knows, so that an unknown address takes as long as a wrong password. */
let decoyHash: Promise<string> | null = null

/**
 * Checks address and password and opens a session.
 *
 * @param input.address who asks, for slowing down guessing (the network address as the server saw it).
 * @returns the new session's id and its person.
 * @throws DomainError `wrong-password` (the same for unknown, disabled and wrong), `too-many-requests` while slowed.
 */
export async function signIn(services: Services, input: { email: string; password: string; address: string }): Promise<{ sessionId: string; actor: Actor }> {
  const email = input.email.trim().toLowerCase()
  const keys = [`account:${email}`, `address:${input.address}`]
  refuseWhileSlowed(services, keys)
  const person = services.db.select().from(people).where(eq(people.email, email)).get()
  decoyHash ??= services.passwords.hash(randomHex(services, 16))
  const right = await services.passwords.verify(person?.passwordHash ?? await decoyHash, input.password)
  if (!person || !right || person.disabledAt) {
    countFailure(services, keys)
    throw new DomainError('wrong-password', 'This address and password do not belong together. Check both and try again.')
  }
  const sessionId = randomHex(services, 24)
  const time = now(services)
  services.db.transaction((tx) => {
    tx.delete(signInFailures).where(inArray(signInFailures.key, keys)).run()
    tx.insert(sessions).values({ id: sessionId, personId: person.id, passwordVersion: person.passwordVersion, createdAt: time, seenAt: time }).run()
    appendToLogbook(services, tx, { actorId: person.id, action: 'session.started', subjectKind: 'person', subjectId: person.id })
  }, { behavior: 'immediate' })
  return { sessionId, actor: { personId: person.id, name: person.name, role: person.role, supplierId: person.supplierId } }
}

function refuseWhileSlowed(services: Services, keys: string[]): void {
  const time = services.clock().getTime()
  for (const failure of services.db.select().from(signInFailures).where(inArray(signInFailures.key, keys)).all()) {
    const left = waitAfter(failure.count) - (time - Date.parse(failure.lastAt))
    if (left > 0) throw new DomainError('too-many-requests', `Too many tries. Wait ${Math.ceil(left / 1000)} seconds and try again.`)
  }
}

function waitAfter(failures: number): number {
  return failures < FREE_TRIES ? 0 : Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** (failures - FREE_TRIES))
}

function countFailure(services: Services, keys: string[]): void {
  const lastAt = now(services)
  services.db.transaction((tx) => {
    for (const key of keys) {
      const count = (tx.select().from(signInFailures).where(eq(signInFailures.key, key)).get()?.count ?? 0) + 1
      tx.insert(signInFailures).values({ key, count, lastAt }).onConflictDoUpdate({ target: signInFailures.key, set: { count, lastAt } }).run()
    }
  }, { behavior: 'immediate' })
}
