import { and, asc, eq, isNotNull } from 'drizzle-orm'
import { nextSeverity } from '#shared/compute/sampling/switching'
import type { Severity } from '#shared/compute/terms/judgement'
import type { Reader } from '../../database/client'
import { decisions, lots, switchingActions } from '../../database/schema/lots'
import { DomainError } from '../domain-error'

/**
 * The severity at which the next lot of a supplier and part is inspected, by the switching rules over all decided lots and the engineers' actions.
 *
 * @throws DomainError `refused` while inspection is discontinued.
 */
export function severityOfNextLot(db: Pick<Reader, 'select'>, key: { supplierId: number; partId: number }): { severity: Severity; reason: string } {
  const state = switchingState(db, key)
  if (state.state === 'discontinued') {
    throw new DomainError('refused', `${state.reason} Lots of this part from this supplier are not inspected until a quality engineer reopens inspection with a reason. Nothing was written.`)
  }
  return { severity: state.severity, reason: state.reason }
}

/** The switching state after all decided lots, in order of their decisions. */
export function switchingState(db: Pick<Reader, 'select'>, key: { supplierId: number; partId: number }) {
  const decided = db.select({ lot: lots, outcome: decisions.outcome, verdict: decisions.lotVerdict }).from(lots).innerJoin(decisions, eq(decisions.lotId, lots.id))
    .where(and(eq(lots.supplierId, key.supplierId), eq(lots.partId, key.partId), isNotNull(lots.decidedAt))).orderBy(asc(decisions.id)).all()
  const actions = db.select().from(switchingActions).where(and(eq(switchingActions.supplierId, key.supplierId), eq(switchingActions.partId, key.partId))).orderBy(asc(switchingActions.id)).all()
  return nextSeverity(toHistory(decided, actions))
}
