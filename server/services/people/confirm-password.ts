import { and, eq, isNull } from 'drizzle-orm'
import { people } from '../../database/schema/people'
import type { Context } from '../context'
import { DomainError } from '../domain-error'

/**
 * First half of an electronic signature: checks the signer's password, outside any transaction because hashing takes time.
 *
 * @returns the password version that was checked; give it to `recheckSigner` inside the transaction that signs.
 * @throws DomainError `wrong-password`.
 */
export async function confirmPassword(context: Context, password: string): Promise<number> {
  const person = context.db.select().from(people).where(eq(people.id, context.actor.personId)).get()
  if (!person || !(await context.passwords.verify(person.passwordHash, password))) {
    throw new DomainError('wrong-password', 'The password is not right. Nothing was signed; type it again.', { fields: [{ field: 'password', message: 'This is not your password.' }] })
  }
  return person.passwordVersion
}

/**
 * Second half: inside the signing transaction, the person must still be enabled, with the same role and the password that was checked.
 *
 * @throws DomainError `conflict`.
 */
export function recheckSigner(context: Context, tx: Pick<Context['db'], 'select'>, passwordVersion: number): void {
  const same = tx.select({ id: people.id }).from(people).where(and(
    eq(people.id, context.actor.personId), eq(people.passwordVersion, passwordVersion), eq(people.role, context.actor.role), isNull(people.disabledAt),
  )).get()
  if (!same) throw new DomainError('conflict', 'Your account changed while you were signing. Nothing was signed; sign in again.')
}
