import { and, eq } from 'drizzle-orm'
import { lots } from '../../database/schema/lots'
import type { Reader } from '../../database/client'
import type { Actor } from '../context'
import { DomainError } from '../domain-error'

/**
 * The lot with that receipt number. A supplier's contact finds its own company's lots only; for anyone else's the answer is the same as for a number that
 * does not exist.
 *
 * @throws DomainError `not-found`.
 */
export function getLot(context: { db: Pick<Reader, 'select'>; actor: Pick<Actor, 'role' | 'supplierId'> }, number: string) {
  const own = context.actor.role === 'supplier' ? eq(lots.supplierId, context.actor.supplierId ?? -1) : undefined
  const lot = context.db.select().from(lots).where(and(eq(lots.number, number), own)).get()
  if (!lot) throw new DomainError('not-found', `There is no lot ${number}. Check the number, or look it up under Lots.`)
  return lot
}
