/** What a person may do; one role each. */
export type Role = 'inspector' | 'engineer' | 'supplier' | 'auditor' | 'administrator' | 'build-engineer'

export const ROLES: readonly Role[] = ['inspector', 'engineer', 'supplier', 'auditor', 'administrator', 'build-engineer']
