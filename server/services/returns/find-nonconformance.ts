import { and, eq } from 'drizzle-orm'
import type { Reader } from '../../database/client'
import { nonconformances } from '../../database/schema/returns'
import type { Actor } from '../context'
import { DomainError } from '../domain-error'

export type Nonconformance = typeof nonconformances.$inferSelect

/**
 * The nonconformance with that number. A supplier's contact finds its own company's only; for anyone else's the answer is the same as for a number that does
 * not exist.
 *
 * @throws DomainError `not-found`.
 */
export function getNonconformance(context: { db: Pick<Reader, 'select'>; actor: Pick<Actor, 'role' | 'supplierId'> }, number: string): Nonconformance {
  const own = context.actor.role === 'supplier' ? eq(nonconformances.supplierId, context.actor.supplierId ?? -1) : undefined
  const found = context.db.select().from(nonconformances).where(and(eq(nonconformances.number, number), own)).get()
  if (!found) throw new DomainError('not-found', `There is no nonconformance ${number}. Check the number, or look it up under Returns.`)
  return found
}
