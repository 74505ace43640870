import { ownPath } from '~/utils/own-path'

/** Pages that need no account. */
const PUBLIC = ['/sign-in', '/docs', '/properties', '/check']

export default defineNuxtRouteMiddleware(async (to) => {
  const isPublic = PUBLIC.some(path => to.path === path || to.path.startsWith(`${path}/`))
  if (isPublic && to.path !== '/sign-in') return
  const { load } = useSession()
  const session = await load()
  if (to.path === '/sign-in') return session ? navigateTo(ownPath(to.query.next)) : undefined
  if (!session) return navigateTo({ path: '/sign-in', query: to.path === '/' ? {} : { next: to.fullPath } })
})
