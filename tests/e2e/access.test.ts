import type { APIRequestContext } from 'playwright-core'
import { describe, expect, inject, it } from 'vitest'
import { mayCall, ROUTE_ACCESS } from '#shared/contracts/access'
import type { RouteKey } from '#shared/contracts/access'
import type { Role } from '#shared/compute/terms/people'
import { errorResponseSchema } from '#shared/contracts/errors'
import { useBrowser, visit } from './support/browser'
import { DEMO_PASSWORD } from './support/pages'

useBrowser()

const PEOPLE: Record<Role, string> = {
  'inspector': 'tobin@kestrelfold.example', 'engineer': 'jonas@kestrelfold.example', 'supplier': 'quality@norrhaven.example', 'auditor': 'ottilie@kestrelfold.example', 'administrator': 'sander@kestrelfold.example', 'build-engineer': 'linnea@kestrelfold.example',
}

/** Calls a route with names of nothing and an empty body: whoever may call it gets as far as 400 or 404, never further, so that nothing changes. */
async function call(request: APIRequestContext, key: RouteKey): Promise<{ status: number; body: unknown }> {
  const [method, pattern] = key.split(' ') as [string, string]
  const path = pattern.replace(':token', '0'.repeat(32)).replace(':sha256', '0'.repeat(64)).replace(':id', '999999').replace(':drawOrder', '9999').replaceAll(/:\w+/g, 'none')
  const response = await request.fetch(path, { method, failOnStatusCode: false, headers: { origin: inject('origin') }, ...(method === 'GET' ? {} : { data: {} }) })
  return { status: response.status(), body: await response.json().catch(() => null) }
}

describe('every route', () => {
  for (const role of [null, ...Object.keys(PEOPLE) as Role[]]) {
    it(`lets ${role ?? 'a visitor'} in exactly where the table says so`, async () => {
      const { context, page } = await visit()
      if (role) expect((await page.request.post('/api/session', { data: { email: PEOPLE[role], password: DEMO_PASSWORD } })).status()).toBe(200)
      const wrong: string[] = []
      for (const key of Object.keys(ROUTE_ACCESS) as RouteKey[]) {
        if (key === 'DELETE /api/session') continue
        const { status, body } = await call(page.request, key)
        const allowed = mayCall(key, role)
        const refused = role === null ? status === 401 : status === 403
        if (allowed === refused || status >= 500) wrong.push(`${key}: ${status}`)
        if (status >= 400 && !errorResponseSchema.safeParse(body).success) wrong.push(`${key}: ${status} in another shape`)
      }
      expect(wrong).toEqual([])
      await context.close()
    })
  }

  it('answers unknown paths and wrong methods in the one shape, and gives visitors no session', async () => {
    const { context, page } = await visit()
    for (const [method, path] of [['GET', '/api/unknown'], ['POST', '/api/dock'], ['DELETE', '/api/lots/26-0001'], ['GET', '/api/lots/26-0001/../../unknown']] as const) {
      const response = await page.request.fetch(path, { method })
      expect([path, response.status()]).toEqual([path, 404])
      expect(errorResponseSchema.safeParse(await response.json()).success).toBe(true)
    }
    await page.request.get('/api/session')
    expect((await context.cookies()).map(cookie => cookie.name)).not.toContain('evenlot')
    await page.request.post('/api/session', { data: { email: PEOPLE.auditor, password: DEMO_PASSWORD } })
    expect((await context.cookies()).find(cookie => cookie.name === 'evenlot')).toMatchObject({ httpOnly: true, secure: true, sameSite: 'Lax' })
    await context.close()
  })

  it('refuses a change that a page of another site sends', async () => {
    const { context, page } = await visit()
    const response = await page.request.post('/api/session', { data: { email: PEOPLE.engineer, password: DEMO_PASSWORD }, headers: { origin: 'https://elsewhere.example' } })
    expect(response.status()).toBe(403)
    await context.close()
  })

  it('ends a session for good when its person signs out', async () => {
    const { context, page } = await visit()
    await page.request.post('/api/session', { data: { email: PEOPLE.auditor, password: DEMO_PASSWORD } })
    const cookies = await context.cookies()
    await page.request.fetch('/api/session', { method: 'DELETE', headers: { origin: inject('origin') } })
    await context.addCookies(cookies)
    expect((await page.request.get('/api/papers')).status()).toBe(401)
    await context.close()
  })
})
