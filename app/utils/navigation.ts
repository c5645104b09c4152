import type { Role } from '#shared/compute/terms/people'

export interface Room { title: string; path: string; roles: readonly Role[] }

const inside = ['inspector', 'engineer', 'auditor', 'administrator', 'build-engineer'] as const

/** The rooms of the house, and who sees each. */
export const ROOMS: readonly Room[] = [
  { title: 'Dock', path: '/dock', roles: ['inspector', 'engineer'] },
  { title: 'Your lots', path: '/supplier', roles: ['supplier'] },
  { title: 'Lots', path: '/lots', roles: inside },
  { title: 'Returns', path: '/returns', roles: ['inspector', 'engineer', 'supplier', 'auditor', 'administrator'] },
  { title: 'Papers', path: '/papers', roles: inside },
  { title: 'Drift', path: '/drift', roles: ['engineer', 'supplier', 'inspector', 'auditor', 'administrator'] },
  { title: 'Limits', path: '/limits', roles: inside },
  { title: 'Rigs', path: '/rigs', roles: inside },
  { title: 'Logbook', path: '/logbook', roles: ['auditor', 'engineer', 'administrator'] },
  { title: 'People', path: '/people', roles: ['administrator'] },
]

const HOME: Record<Role, string> = { 'inspector': '/dock', 'engineer': '/dock', 'supplier': '/supplier', 'auditor': '/papers', 'administrator': '/people', 'build-engineer': '/lots' }

/** The page on which a role begins its day. */
export const homeOf = (role: Role): string => HOME[role]

export const ROLE_WORDS: Record<Role, string> = { 'inspector': 'Inspector', 'engineer': 'Quality engineer', 'supplier': 'Supplier', 'auditor': 'Auditor', 'administrator': 'Administrator', 'build-engineer': 'Build engineer' }
