import { ownPath } from '~/utils/own-path'

/** Pages that need no account. */
const PUBLIC = ['/docs', '/properties', '/verify']

/** Leads to the sign-in page and back; the server checks every request again by itself. */
export default defineNuxtRouteMiddleware(async (to) => {
  if (PUBLIC.some(path => to.path === path || to.path.startsWith(`${path}/`))) return
  const { load } = useSession()
  const session = await load()
  if (to.path === '/sign-in') return session ? navigateTo(ownPath(to.query.next)) : undefined
  if (!session) return navigateTo({ path: '/sign-in', query: to.path === '/' ? {} : { next: to.fullPath } })
})
