import { ROUTE_ACCESS } from '#shared/contracts/access'
import { DomainError } from '../services/domain-error'
import { answerWithError } from '../utils/error-response'

const ROUTES = Object.keys(ROUTE_ACCESS).map((key) => {
  const [method, pattern] = key.split(' ') as [string, string]
  return { method, path: new RegExp(`^${pattern.replaceAll('.', '\\.').replaceAll(/:\w+/g, '[^/]+')}$`) }
})

/** Unknown paths and wrong methods under /api get the one shape of error; they would fall through to the pages otherwise. */
export default defineEventHandler((event) => {
  const path = event.path.split('?')[0]!
  if (!path.startsWith('/api/')) return
  // Nuxt's own routes, such as the icons' or the session module's, are not ours to judge.
  if (path.startsWith('/api/_')) return
  const method = event.method === 'HEAD' ? 'GET' : event.method
  if (ROUTES.some(route => route.method === method && route.path.test(path))) return
  return answerWithError(event, new DomainError('not-found', `There is nothing at ${event.method} ${path.slice(0, 80)}. Nothing was changed.`))
})
