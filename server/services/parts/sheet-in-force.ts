import { and, desc, eq, lte } from 'drizzle-orm'
import { limitSheets } from '../../database/schema/parts'
import type { Reader } from '../../database/client'
import type { LimitSheetContent, NonconformityClass } from '#shared/compute/terms/judgement'
import { DomainError } from '../domain-error'

/**
 * The limit sheet by which a lot received at that moment is judged: the newest approved one that is effective.
 *
 * @param at ISO 8601 time of receipt.
 * @throws DomainError `refused` when the part has no approved sheet.
 */
export function getSheetInForce(db: Pick<Reader, 'select'>, part: { id: number; number: string }, at: string) {
  const sheet = db.select().from(limitSheets)
    .where(and(eq(limitSheets.partId, part.id), eq(limitSheets.state, 'approved'), lte(limitSheets.effectiveFrom, at)))
    .orderBy(desc(limitSheets.effectiveFrom), desc(limitSheets.version)).limit(1).get()
  if (!sheet) throw new DomainError('refused', `Part ${part.number} has no approved limit sheet, so nothing can be judged. Ask a quality engineer to approve one, then receive the lot.`)
  return sheet
}

/** The classes that a sheet's limits use; each needs a count in the plan. */
export function limitedClasses(content: LimitSheetContent): NonconformityClass[] {
  return [...new Set(content.limits.map(limit => limit.class))]
}
