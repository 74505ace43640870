import { withoutOrganisation } from '../../database/tenancy'
import { verifyPassword } from './passwords'
import { openSession } from './sessions'
import { SignInThrottle } from './throttle'

const throttle = new SignInThrottle()

export type SignInOutcome =
  | { kind: 'opened', secret: string }
  /** Unknown address, wrong password or disabled account: one answer for all. */
  | { kind: 'refused' }
  | { kind: 'throttled', retryAfterSeconds: number }
  | { kind: 'demo-off-loopback' }

/** Checks address and password and opens a session. */
export async function signIn({ email, password, address, userAgent, loopbackOnly, now }: {
  email: string, password: string, address: string, userAgent: string, loopbackOnly: boolean, now: Date
}): Promise<SignInOutcome> {
  const account = email.toLowerCase()
  const retryAfterSeconds = throttle.refuses({ account, address, now })
  if (retryAfterSeconds > 0) return { kind: 'throttled', retryAfterSeconds }
  const [person] = await withoutOrganisation(client => client<{ organisation_id: string, person_id: string, password_hash: string, disabled: boolean, demo: boolean }[]>`
    select * from find_person(${account})`)
  const right = await verifyPassword(password, person?.password_hash ?? null)
  if (!person || !right || person.disabled) {
    throttle.failed({ account, address, now })
    return { kind: 'refused' }
  }
  // Demo passwords are printed for everyone to see, so they open nothing that others can reach.
  if (person.demo && !loopbackOnly) return { kind: 'demo-off-loopback' }
  throttle.succeeded({ account, address })
  return { kind: 'opened', secret: await openSession({ organisationId: person.organisation_id, personId: person.person_id, userAgent, now }) }
}
