import { and, asc, eq } from 'drizzle-orm'
import { nextSeverity, switchingPoints } from '#shared/compute/sampling/switching'
import type { SwitchingEvent, SwitchingState } from '#shared/compute/sampling/switching'
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

/** The switching state after all decided lots and the engineers' actions, in the order in which they happened. */
export function switchingState(db: Pick<Reader, 'select'>, key: { supplierId: number; partId: number }): SwitchingState {
  const decided = db.select({ lot: lots, decision: decisions }).from(lots).innerJoin(decisions, eq(decisions.lotId, lots.id))
    .where(and(eq(lots.supplierId, key.supplierId), eq(lots.partId, key.partId))).orderBy(asc(decisions.id)).all()
  const actions = db.select().from(switchingActions).where(and(eq(switchingActions.supplierId, key.supplierId), eq(switchingActions.partId, key.partId))).orderBy(asc(switchingActions.id)).all()
  const events: { at: string; event: SwitchingEvent }[] = [
    ...decided.map(({ lot, decision }) => ({ at: decision.signedAt, event: lotEvent(lot, decision) })),
    ...actions.map(action => ({ at: action.at, event: { kind: action.kind } satisfies SwitchingEvent })),
  ]
  return nextSeverity(events.sort((a, b) => a.at < b.at ? -1 : a.at > b.at ? 1 : 0).map(row => row.event))
}

function lotEvent(lot: typeof lots.$inferSelect, decision: typeof decisions.$inferSelect): SwitchingEvent {
  const accepted = decision.outcome === 'accepted'
  return {
    kind: 'lot', severity: lot.severity, accepted, resubmitted: lot.resubmissionOfId !== null, returnToNormal: decision.lotVerdict.returnToNormal,
    points: accepted ? switchingPoints({ plan: lot.plan, verdict: decision.lotVerdict }) : 0,
  }
}
