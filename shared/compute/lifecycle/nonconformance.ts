import { defineLifecycle } from './lifecycle'

export type NonconformanceState = 'open' | 'notified' | 'acknowledged' | 'answered' | 'accepted-answer' | 'sent-back' | 'closed'
export type NonconformanceAction = 'notify' | 'acknowledge' | 'answer' | 'accept-answer' | 'send-back' | 'close'

/**
 * Life cycle of a nonconformance. The notice goes out with the decision; the supplier acknowledges and answers; the engineer
 * accepts the answer or sends it back, also later when the next lots do not bear it out, and closes when they do.
 */
export const nonconformanceLifecycle = defineLifecycle<NonconformanceState, NonconformanceAction>('nonconformanceLifecycle', 'open', [
  { from: 'open', action: 'notify', to: 'notified', roles: [] },
  { from: 'notified', action: 'acknowledge', to: 'acknowledged', roles: ['supplier'] },
  { from: 'acknowledged', action: 'answer', to: 'answered', roles: ['supplier'] },
  { from: 'answered', action: 'accept-answer', to: 'accepted-answer', roles: ['engineer'] },
  { from: 'answered', action: 'send-back', to: 'sent-back', roles: ['engineer'] },
  { from: 'sent-back', action: 'answer', to: 'answered', roles: ['supplier'] },
  { from: 'accepted-answer', action: 'send-back', to: 'sent-back', roles: ['engineer'] },
  { from: 'accepted-answer', action: 'close', to: 'closed', roles: ['engineer'] },
])
