import { defineLifecycle } from './lifecycle'

export type PaperState = 'issued' | 'superseded' | 'withdrawn'
export type PaperAction = 'supersede' | 'withdraw'

/** Life cycle of a certificate: never edited, only superseded by another or withdrawn, each with a reason. */
export const paperLifecycle = defineLifecycle<PaperState, PaperAction>('paperLifecycle', 'issued', [
  { from: 'issued', action: 'supersede', to: 'superseded', roles: ['engineer'] },
  { from: 'issued', action: 'withdraw', to: 'withdrawn', roles: ['engineer'] },
])
