import type { Role } from '../compute/terms/people'

/** Who may call a route: anyone, anyone signed in, or the roles named. Ownership (a supplier sees its own lots only) is checked by the services on top. */
export type Access = 'public' | 'signed-in' | readonly Role[]

const inside = ['inspector', 'engineer', 'auditor', 'administrator', 'build-engineer'] as const
const insideAndSupplier = [...inside, 'supplier'] as const

/** Every route of the server, by method and path as Nitro names it. The guard reads this table; a test fails when a route is missing from it. */
export const ROUTE_ACCESS = {
  'POST /api/session': 'public',
  'DELETE /api/session': 'signed-in',
  'GET /api/session': 'public',
  'GET /api/demo': 'public',

  'POST /api/scans': ['inspector', 'engineer'],
  'GET /api/dock': ['inspector', 'engineer'],
  'GET /api/suppliers': inside,
  'GET /api/rigs': inside,
  'POST /api/rigs/:code/recipe': ['inspector', 'engineer'],

  'GET /api/lots': insideAndSupplier,
  'POST /api/lots': ['inspector', 'engineer'],
  'POST /api/lots/plan-preview': ['inspector', 'engineer'],
  'GET /api/lots/:number': insideAndSupplier,
  'POST /api/lots/:number/uploads': ['inspector', 'engineer'],
  'POST /api/lots/:number/samples/:drawOrder/serial': ['inspector', 'engineer'],
  'POST /api/lots/:number/decision': ['inspector', 'engineer'],
  'GET /api/lots/:number/motors/:serial': insideAndSupplier,
  'GET /api/lots/:number/results': insideAndSupplier,
  'GET /api/files/:sha256': insideAndSupplier,
  'POST /api/uploads/:id/assignment': ['inspector', 'engineer'],
  'POST /api/uploads/:id/discard': ['inspector', 'engineer'],
  'POST /api/measurements/:id/voiding': ['engineer'],
} as const satisfies Record<string, Access>

export type RouteKey = keyof typeof ROUTE_ACCESS

/** Whether a role may call a route; null stands for a visitor who is not signed in. */
export function mayCall(key: RouteKey, role: Role | null): boolean {
  const access: Access = ROUTE_ACCESS[key]
  if (access === 'public') return true
  if (role === null) return false
  return access === 'signed-in' || access.includes(role)
}
