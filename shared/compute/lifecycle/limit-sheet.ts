import { defineLifecycle } from './lifecycle'

export type LimitSheetState = 'draft' | 'submitted' | 'approved' | 'retired'
export type LimitSheetAction = 'edit' | 'submit' | 'send-back' | 'approve' | 'retire'

/** Life cycle of a limit sheet's version. That a second person approves is the service's to check: the table knows roles only. */
export const limitSheetLifecycle = defineLifecycle<LimitSheetState, LimitSheetAction>('limitSheetLifecycle', 'draft', [
  { from: 'draft', action: 'edit', to: 'draft', roles: ['engineer'] },
  { from: 'draft', action: 'submit', to: 'submitted', roles: ['engineer'] },
  { from: 'submitted', action: 'send-back', to: 'draft', roles: ['engineer'] },
  { from: 'submitted', action: 'approve', to: 'approved', roles: ['engineer'] },
  { from: 'approved', action: 'retire', to: 'retired', roles: ['engineer'] },
])
