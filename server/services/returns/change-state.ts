import { eq } from 'drizzle-orm'
import { nonconformanceLifecycle } from '#shared/compute/lifecycle/nonconformance'
import type { NonconformanceAction, NonconformanceState } from '#shared/compute/lifecycle/nonconformance'
import type { Transaction } from '../../database/client'
import { nonconformances } from '../../database/schema/returns'
import { DomainError } from '../domain-error'
import type { Nonconformance } from './find-nonconformance'

/** States in words, for sentences about them. */
const STATE_WORDS: Record<NonconformanceState, string> = {
  'open': 'open', 'notified': 'waiting for the supplier\'s acknowledgement', 'acknowledged': 'waiting for the supplier\'s answer', 'answered': 'answered and waiting for review',
  'accepted-answer': 'answered, and the answer is accepted', 'sent-back': 'sent back to the supplier', 'closed': 'closed',
}

/**
 * Takes an action of the life cycle and stores the new state.
 *
 * @throws DomainError `conflict` when the table of transitions does not allow it in this state.
 */
export function changeState(tx: Transaction, nonconformance: Pick<Nonconformance, 'id' | 'number' | 'state'>, action: NonconformanceAction): NonconformanceState {
  const allowed = nonconformanceLifecycle.transitions.some(row => row.from === nonconformance.state && row.action === action)
  if (!allowed) throw new DomainError('conflict', `${nonconformance.number} is ${STATE_WORDS[nonconformance.state]}; this step does not fit now. Nothing was changed; load the page again.`, { link: `/returns/${nonconformance.number}` })
  const state = nonconformanceLifecycle.transition(nonconformance.state, action)
  tx.update(nonconformances).set({ state }).where(eq(nonconformances.id, nonconformance.id)).run()
  return state
}
