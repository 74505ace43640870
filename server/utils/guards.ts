import type { H3Event } from 'h3'
import { can, type Right } from '#shared/access/roles'
import { findMember, type Member } from '../services/accounts/sessions'
import { identifyDevice, type Device } from '../services/instruments/identify-device'
import { noteUse } from '../services/instruments/note-use'
import type { Scope } from '../services/readings/reading-filters'
import { Problem } from './problem'

export const SESSION_COOKIE = 'coldslip-session'

/** The network address a request came from, as far as the configured proxies are believed. */
export function clientAddress(event: H3Event, trustedProxies: number): string {
  const direct = event.node.req.socket.remoteAddress ?? 'unknown'
  if (trustedProxies === 0) return direct
  const chain = (getHeader(event, 'x-forwarded-for') ?? '').split(',').map(part => part.trim()).filter(Boolean)
  return chain.at(-trustedProxies) ?? direct
}

/**
 * A request that changes something must come from our own pages: browsers say where it comes from
 * (fetch metadata, else Origin). A program without a browser sends a token instead of a cookie.
 */
export function requireSameOrigin(event: H3Event): void {
  const site = getHeader(event, 'sec-fetch-site')
  const origin = getHeader(event, 'origin')
  const own = site ? site === 'same-origin' || site === 'none' : origin !== undefined && URL.canParse(origin) && new URL(origin).host === getHeader(event, 'host')
  if (!own) throw new Problem(403, 'cross-site', 'This request did not come from a page of this server.')
}

/** The signed-in person, proved by a session row at every request; null where nobody is signed in. */
export async function findSignedIn(event: H3Event): Promise<Member | null> {
  // Asking for the session makes one; a request without the cookie must stay without.
  if (!getCookie(event, SESSION_COOKIE)) return null
  const session = await getUserSession(event)
  const secret = session.secure?.secret
  return typeof secret === 'string' ? findMember(secret, new Date()) : null
}

/**
 * The signed-in person with a right; changing requests must come from our own pages.
 *
 * @throws Problem 401 without a session, 403 without the right.
 */
export async function requireMember(event: H3Event, right: Right | 'signed-in'): Promise<Member> {
  const member = await findSignedIn(event)
  if (!member) throw new Problem(401, 'signed-out', 'You are not signed in.', { headers: { 'www-authenticate': 'Session' } })
  if (event.method !== 'GET' && event.method !== 'HEAD') requireSameOrigin(event)
  if (right !== 'signed-in' && !can(member.roles, right)) throw new Problem(403, 'forbidden', 'Your role does not include this.')
  return member
}

const unauthorised = () => new Problem(401, 'token', 'Send a valid device token: Authorization: Bearer …', { headers: { 'www-authenticate': 'Bearer realm="coldslip"' } })

/**
 * The device behind the bearer token, with a scope. One answer for missing, malformed, unknown, revoked and expired.
 *
 * @throws Problem 401, 403 where the token may not do this.
 */
export async function requireDevice(event: H3Event, scope: 'intake' | 'read'): Promise<Device> {
  const header = getHeader(event, 'authorization') ?? ''
  const token = /^Bearer ([\x21-\x7E]{1,200})$/i.exec(header)?.[1]
  const now = new Date()
  const device = token ? await identifyDevice(token, now) : null
  if (!device) throw unauthorised()
  await noteUse(device, now)
  if (!device.scopes.includes(scope)) throw new Problem(403, 'scope', `This token may not do that: it lacks the scope "${scope}".`)
  return device
}

/** A person's or a reading token's view of readings. */
export async function requireReader(event: H3Event): Promise<Scope> {
  if (getHeader(event, 'authorization')) {
    const device = await requireDevice(event, 'read')
    return { organisationId: device.organisationId, shopIds: [device.shopId] }
  }
  return requireMember(event, 'readings.see')
}
