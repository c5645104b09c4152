import { homeOf, ROOMS } from '~/utils/navigation'

const OPEN = ['/sign-in', '/check', '/mailbox']
/** After so long a browser asks again whether its session still holds, ms. */
const RECHECK_MS = 60_000

/** Sends visitors to the sign-in page, and people to rooms of theirs. */
export default defineNuxtRouteMiddleware(async (to) => {
  const session = useSessionStore()
  await refresh(session)
  if (OPEN.some(path => to.path === path || to.path.startsWith(`${path}/`))) return
  if (!session.person) return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { to: to.fullPath } })
  if (to.path === '/') return navigateTo(homeOf(session.person.role), { replace: true })
  const role = session.person.role
  const room = ROOMS.find(each => to.path === each.path || to.path.startsWith(`${each.path}/`))
  // A supplier's contact opens single lots and motors of its own; the list of all lots is for people inside.
  if (room && !room.roles.includes(role) && !(role === 'supplier' && room.path === '/lots' && to.path !== '/lots')) return navigateTo(homeOf(role), { replace: true })
})

async function refresh(session: ReturnType<typeof useSessionStore>): Promise<void> {
  if (!session.loaded) return session.load()
  if (import.meta.server || performance.now() - session.checkedAt < RECHECK_MS) return
  // Without an answer the page itself will say that the server cannot be reached.
  await session.load().catch(() => undefined)
}
