import { defineLifecycle } from './lifecycle'

export type LotState = 'received' | 'drawn' | 'measuring' | 'ready' | 'accepted' | 'rejected' | 'on-hold' | 'dispositioned' | 'closed'
export type LotAction = 'draw' | 'measure' | 'finish-measuring' | 'reopen-measuring' | 'accept' | 'reject' | 'hold' | 'disposition' | 'close'

export type Disposition = 'return-to-supplier' | 'sort' | 'rework' | 'concession' | 'scrap'

/** What can be done with a rejected lot; a concession is acceptance against the plan, on the record. */
export const DISPOSITIONS: readonly Disposition[] = ['return-to-supplier', 'sort', 'rework', 'concession', 'scrap']

/**
 * Life cycle of a lot. Measuring begins with the first file and ends when the plan can decide (every sample judged, or the
 * rejection number reached); a voided attempt takes it back. Rejection puts the lot on hold in the same transaction.
 */
export const lotLifecycle = defineLifecycle<LotState, LotAction>('lotLifecycle', 'received', [
  { from: 'received', action: 'draw', to: 'drawn', roles: ['inspector', 'engineer'] },
  { from: 'drawn', action: 'measure', to: 'measuring', roles: ['inspector', 'engineer'] },
  { from: 'measuring', action: 'measure', to: 'measuring', roles: ['inspector', 'engineer'] },
  { from: 'measuring', action: 'finish-measuring', to: 'ready', roles: [] },
  { from: 'ready', action: 'measure', to: 'ready', roles: ['inspector', 'engineer'] },
  { from: 'ready', action: 'reopen-measuring', to: 'measuring', roles: [] },
  { from: 'ready', action: 'accept', to: 'accepted', roles: ['inspector', 'engineer'] },
  { from: 'ready', action: 'reject', to: 'rejected', roles: ['inspector', 'engineer'] },
  { from: 'rejected', action: 'hold', to: 'on-hold', roles: [] },
  { from: 'on-hold', action: 'disposition', to: 'dispositioned', roles: ['engineer'] },
  { from: 'dispositioned', action: 'close', to: 'closed', roles: ['engineer'] },
])
