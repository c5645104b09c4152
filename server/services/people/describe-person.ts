import { eq } from 'drizzle-orm'
import type { Person } from '#shared/contracts/session'
import { suppliers } from '../../database/schema/people'
import type { Actor, Services } from '../context'

/** A person as the pages show it. */
export function describePerson(services: Pick<Services, 'db'>, actor: Actor): Person {
  const supplier = actor.supplierId === null ? null : services.db.select({ name: suppliers.name }).from(suppliers).where(eq(suppliers.id, actor.supplierId)).get()?.name ?? null
  return { id: actor.personId, name: actor.name, role: actor.role, supplier }
}
