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
  'GET /api/demo/packing-lists/:supplierLot': ['inspector', 'engineer'],
  'GET /api/demo/lots/:number/files': ['inspector', 'engineer'],

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

  'GET /api/parts': inside,
  'POST /api/parts': ['engineer'],
  'GET /api/parts/:number': inside,
  'PUT /api/parts/:number': ['engineer'],
  'POST /api/parts/:number/sheets': ['engineer'],
  'PUT /api/sheets/:id': ['engineer'],
  'POST /api/sheets/:id/submission': ['engineer'],
  'POST /api/sheets/:id/send-back': ['engineer'],
  'POST /api/sheets/:id/approval': ['engineer'],
  'POST /api/sheets/:id/retirement': ['engineer'],
  'POST /api/rigs': ['engineer'],
  'GET /api/rigs/:code': inside,
  'PUT /api/rigs/:code': ['engineer'],
  'POST /api/rigs/:code/calibrations': ['engineer'],

  'GET /api/papers': inside,
  'GET /api/papers/:number': inside,
  'GET /api/papers/:number/pdf': insideAndSupplier,
  'POST /api/papers/:number/withdrawal': ['engineer'],
  'GET /api/check/:token': 'public',
  'GET /api/check/:token/pdf': 'public',
  'GET /api/check/:token/files/:sha256': 'public',

  'GET /api/drift': ['engineer', 'supplier', 'inspector', 'auditor', 'administrator'],
  'GET /api/drift/suppliers': ['engineer', 'auditor', 'administrator'],
  'POST /api/drift/bases': ['engineer'],

  'GET /api/nonconformances': ['engineer', 'inspector', 'auditor', 'administrator', 'supplier'],
  'GET /api/nonconformances/:number': ['engineer', 'inspector', 'auditor', 'administrator', 'supplier'],
  'POST /api/nonconformances/:number/acknowledgement': ['supplier'],
  'POST /api/nonconformances/:number/answer': ['supplier'],
  'POST /api/nonconformances/:number/review': ['engineer'],
  'POST /api/nonconformances/:number/disposition': ['engineer'],
  'POST /api/nonconformances/:number/messages': ['engineer', 'supplier'],
  'POST /api/nonconformances/:number/notices/:id/resend': ['engineer'],
  'POST /api/nonconformances/:number/closing': ['engineer'],
  'GET /api/demo/mailbox': 'public',
  'GET /api/demo/mailbox/:id': 'public',
  'GET /api/demo/mailbox/:id/attachments/:ordinal': 'public',

  'GET /api/logbook': ['auditor', 'engineer', 'administrator'],
  'GET /api/logbook/check': ['auditor', 'engineer', 'administrator'],
  'GET /api/people': ['administrator'],
  'POST /api/people': ['administrator'],
  'PATCH /api/people/:id': ['administrator'],
  'POST /api/people/:id/disabling': ['administrator'],
  'POST /api/people/:id/enabling': ['administrator'],
  'POST /api/people/:id/password': ['administrator'],
} as const satisfies Record<string, Access>

/** Routes that answer everyone without looking at who asks, and why. */
export const ROUTES_OUTSIDE_THE_TABLE: Record<string, string> = {}

export type RouteKey = keyof typeof ROUTE_ACCESS

/** Whether a role may call a route; null stands for a visitor who is not signed in. */
export function mayCall(key: RouteKey, role: Role | null): boolean {
  const access: Access = ROUTE_ACCESS[key]
  if (access === 'public') return true
  if (role === null) return false
  return access === 'signed-in' || access.includes(role)
}
