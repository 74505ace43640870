import { ROUTES } from '../utils/routes'

/** Whatever no other handler answers: a known address with another method, or nothing at all. */
export default apiHandler((event) => {
  const path = event.path.split('?')[0]!
  const methods = ROUTES.filter(route => route.pattern.test(path)).map(route => route.method)
  if (methods.length > 0 && !methods.includes(event.method)) {
    throw new Problem(405, 'method', `${event.method} is not possible here.`, { headers: { allow: methods.join(', ') } })
  }
  throw notFound()
})
