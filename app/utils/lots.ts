import type { LotState } from '#shared/compute/lifecycle/lot'
import type { LotSummary } from '#shared/contracts/lots'

const WORDS: Record<LotState, string> = {
  'received': 'received', 'drawn': 'to measure', 'measuring': 'measuring', 'ready': 'to decide', 'accepted': 'accepted', 'rejected': 'rejected', 'on-hold': 'rejected, on hold',
  'dispositioned': 'disposition decided', 'closed': 'closed',
}

/** State of a lot in a word or two. */
export const lotStateWord = (state: LotState): string => WORDS[state]

/** Whether the lot was rejected, whatever became of it since. */
export const isRejected = (state: LotState): boolean => ['rejected', 'on-hold', 'dispositioned', 'closed'].includes(state)

/** A whole number with a no-break space between thousands. */
export const formatCount = (value: number): string => String(value).replaceAll(/\B(?=(\d{3})+$)/g, '\u00A0')

/** What a lot waits for, as the Dock groups it. */
export function waitsFor(lot: LotSummary): 'decide' | 'measure' | 'disposition' {
  if (lot.state === 'on-hold') return 'disposition'
  return lot.state === 'ready' ? 'decide' : 'measure'
}
