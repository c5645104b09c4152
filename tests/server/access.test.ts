import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { ROUTES_OUTSIDE_THE_TABLE, ROUTE_ACCESS, mayCall } from '#shared/contracts/access'
import type { RouteKey } from '#shared/contracts/access'
import { routeFiles } from './support/routes'

describe('the table of access', () => {
  const routes = routeFiles()

  it('finds the routes of the server', () => {
    expect(routes.length).toBeGreaterThan(20)
  })

  it.each(routes)('names $key, and the handler is guarded by that very entry', ({ key, file }) => {
    const source = readFileSync(file, 'utf8')
    if (key in ROUTES_OUTSIDE_THE_TABLE) return expect(source).not.toContain('guardedRoute(')
    expect(Object.keys(ROUTE_ACCESS)).toContain(key)
    const guard = ROUTE_ACCESS[key as RouteKey] === 'public' ? 'publicRoute' : 'guardedRoute'
    expect(source).toContain(`export default ${guard}('${key}'`)
  })

  it('names no route that does not exist', () => {
    const built = new Set(routes.map(route => route.key))
    expect([...Object.keys(ROUTE_ACCESS), ...Object.keys(ROUTES_OUTSIDE_THE_TABLE)].filter(key => !built.has(key))).toEqual([])
  })

  it('lets a visitor call public routes only', () => {
    for (const key of Object.keys(ROUTE_ACCESS) as RouteKey[]) expect(mayCall(key, null)).toBe(ROUTE_ACCESS[key] === 'public')
  })

  it('keeps suppliers from everything that changes a lot', () => {
    const changing = (Object.keys(ROUTE_ACCESS) as RouteKey[]).filter(key => key.startsWith('POST /api/lots'))
    expect(changing.length).toBeGreaterThan(3)
    for (const key of changing) expect(mayCall(key, 'supplier')).toBe(false)
  })
})
