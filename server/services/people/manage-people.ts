import { and, eq, isNull, ne, sql } from 'drizzle-orm'
import { addPersonSchema } from '#shared/contracts/people'
import type { PersonInput } from '#shared/contracts/people'
import type { Transaction } from '../../database/client'
import { people, sessions, suppliers } from '../../database/schema/people'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'

const fieldFault = (field: string, message: string) => new DomainError('invalid-input', message, { fields: [{ field, message }] })

function getPerson(tx: Transaction, id: number) {
  const person = tx.select().from(people).where(eq(people.id, id)).get()
  if (!person) throw new DomainError('not-found', 'There is no such person.')
  return person
}

/** The supplier a person belongs to: needed for the role supplier, and for no other. */
function supplierOf(tx: Transaction, input: Pick<PersonInput, 'role' | 'supplierCode'>): number | null {
  if (input.role !== 'supplier') {
    if (input.supplierCode) throw fieldFault('supplierCode', 'Only people with the role supplier belong to one.')
    return null
  }
  const supplier = input.supplierCode ? tx.select().from(suppliers).where(eq(suppliers.code, input.supplierCode)).get() : undefined
  if (!supplier) throw fieldFault('supplierCode', 'Choose the supplier this person works for.')
  return supplier.id
}

function refuseTakenAddress(tx: Transaction, email: string, exceptId: number): void {
  if (tx.select({ id: people.id }).from(people).where(and(eq(people.email, email), ne(people.id, exceptId))).get()) throw fieldFault('email', `${email} has an account already.`)
}

/** Adds an account with a first password. */
export async function addPerson(context: Context, input: PersonInput & { password: string }): Promise<{ id: number }> {
  const person = addPersonSchema.parse(input)
  const passwordHash = await context.passwords.hash(person.password)
  return context.db.transaction((tx) => {
    refuseTakenAddress(tx, person.email, 0)
    const supplierId = supplierOf(tx, person)
    const row = tx.insert(people).values({ name: person.name, email: person.email, role: person.role, supplierId, noticeRank: supplierId === null ? null : person.noticeRank, passwordHash, createdAt: now(context) }).returning().get()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'person.added', subjectKind: 'person', subjectId: row.id, content: { role: row.role, supplierId } })
    return { id: row.id }
  }, { behavior: 'immediate' })
}

/** Changes name, address, role and supplier. A changed role ends the person's sessions. */
export function changePerson(context: Context, id: number, input: Omit<PersonInput, 'email'> & { email?: string }): void {
  context.db.transaction((tx) => {
    const person = getPerson(tx, id)
    if (input.email) refuseTakenAddress(tx, input.email, id)
    if (person.role === 'administrator' && input.role !== 'administrator') refuseLastAdministrator(tx, id)
    const supplierId = supplierOf(tx, input)
    tx.update(people).set({ name: input.name, email: input.email ?? person.email, role: input.role, supplierId, noticeRank: supplierId === null ? null : input.noticeRank ?? null }).where(eq(people.id, id)).run()
    if (person.role !== input.role || person.supplierId !== supplierId) endSessions(context, tx, id)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'person.changed', subjectKind: 'person', subjectId: id, content: { role: input.role, supplierId } })
  }, { behavior: 'immediate' })
}

/** Disables or enables an account; disabling ends its sessions at once. */
export function setPersonDisabled(context: Context, id: number, disabled: boolean): void {
  context.db.transaction((tx) => {
    const person = getPerson(tx, id)
    if (disabled && id === context.actor.personId) throw new DomainError('conflict', 'You cannot disable your own account. Ask another administrator.')
    if (disabled && person.role === 'administrator') refuseLastAdministrator(tx, id)
    tx.update(people).set({ disabledAt: disabled ? now(context) : null }).where(eq(people.id, id)).run()
    if (disabled) endSessions(context, tx, id)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: disabled ? 'person.disabled' : 'person.enabled', subjectKind: 'person', subjectId: id })
  }, { behavior: 'immediate' })
}

/** Sets a new password; every session of the person ends. */
export async function resetPassword(context: Context, id: number, password: string): Promise<void> {
  const passwordHash = await context.passwords.hash(password)
  context.db.transaction((tx) => {
    getPerson(tx, id)
    tx.update(people).set({ passwordHash, passwordVersion: sql`${people.passwordVersion} + 1` }).where(eq(people.id, id)).run()
    endSessions(context, tx, id)
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'person.password-reset', subjectKind: 'person', subjectId: id })
  }, { behavior: 'immediate' })
}

function endSessions(context: Context, tx: Transaction, personId: number): void {
  tx.update(sessions).set({ endedAt: now(context) }).where(and(eq(sessions.personId, personId), isNull(sessions.endedAt))).run()
}

function refuseLastAdministrator(tx: Transaction, id: number): void {
  const other = tx.select({ id: people.id }).from(people).where(and(eq(people.role, 'administrator'), isNull(people.disabledAt), ne(people.id, id))).get()
  if (!other) throw new DomainError('conflict', 'This is the last administrator; nobody could manage accounts any more. Add another one first.')
}
