import { signInBody } from '#shared/api/session'
import { findMember } from '../../services/accounts/sessions'
import { signIn } from '../../services/accounts/sign-in'
import { settings } from '../../settings'

/** Signs in: a session row, and its secret sealed into the cookie. */
export default apiHandler(async (event) => {
  requireSameOrigin(event)
  const { email, password } = await readJsonBody(event, signInBody)
  const { loopbackOnly, trustedProxies } = settings()
  const now = new Date()
  const outcome = await signIn({ email, password, address: clientAddress(event, trustedProxies), userAgent: getHeader(event, 'user-agent') ?? '', loopbackOnly, now })
  switch (outcome.kind) {
    case 'opened':
      await replaceUserSession(event, { secure: { secret: outcome.secret } })
      return (await findMember(outcome.secret, now))!.view
    case 'throttled':
      throw new Problem(429, 'throttled', 'Too many wrong passwords. Wait a while and try again.', { headers: { 'retry-after': String(outcome.retryAfterSeconds) } })
    case 'demo-off-loopback':
      throw new Problem(403, 'demo', 'Demo accounts work only on the machine itself (127.0.0.1), because their passwords are public.')
    case 'refused':
      throw new Problem(401, 'sign-in', 'The address or the password is wrong.')
  }
})
