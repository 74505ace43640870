import { createHash, randomBytes } from 'node:crypto'
import type { Role } from '#shared/access/roles'
import type { SessionRow, SessionView } from '#shared/api/session'
import { withOrganisationBulk, withoutOrganisation } from '../../database/tenancy'
import { appendAuditEvent } from '../audit/append-event'
import { uuidV7 } from '../ids/uuid-v7'

/** A working day: shorter would make people share one sign-in at the bay, longer would outlast a stolen tablet's shift. */
const IDLE_HOURS = 12
const ABSOLUTE_DAYS = 7
/** How stale `last_seen_at` may be; a write at every request would be for nothing. */
const SEEN_MINUTES = 5

/** Who a request comes from, as its session row proves it. */
export interface Member {
  organisationId: string
  sessionId: string
  personId: string
  /** All roles in any shop. */
  roles: Role[]
  /** Shops that the person belongs to: what they see and enter is of these. */
  shopIds: string[]
  view: SessionView
}

interface Place { shopId: string, name: string, timeZone: string, role: Role }
interface Row {
  organisation_id: string, session_id: string, person_id: string, person_name: string, email: string
  organisation_name: string, demo: boolean, last_seen_at: Date, expires_at: Date, revoked: boolean, disabled: boolean, places: Place[]
}

const digestOf = (secret: string): Buffer => createHash('sha256').update(secret).digest()

/** Opens a session: a new secret for the cookie, its digest in a row. */
export async function openSession({ organisationId, personId, userAgent, now }: { organisationId: string, personId: string, userAgent: string, now: Date }): Promise<string> {
  const secret = randomBytes(32).toString('base64url')
  const id = uuidV7(now.getTime())
  await withOrganisationBulk(organisationId, async (tx) => {
    await tx`
      insert into sessions (organisation_id, id, person_id, digest, user_agent, created_at, last_seen_at, expires_at)
      values (${organisationId}, ${id}, ${personId}, ${digestOf(secret)}, ${userAgent.slice(0, 300)}, ${now}, ${now}, ${new Date(now.getTime() + ABSOLUTE_DAYS * 86_400_000)})`
    await appendAuditEvent(tx, { organisationId, at: now, actor: `person:${personId}`, action: 'session.opened', entityKind: 'session', entityId: id, detail: {} })
  })
  return secret
}

/** The member behind a cookie's secret; null where the session is unknown, ended, idle too long, or its person disabled. */
export async function findMember(secret: string, now: Date): Promise<Member | null> {
  const [row] = await withoutOrganisation(client => client<Row[]>`select * from find_session(${digestOf(secret)})`)
  if (!row || row.revoked || row.disabled || row.expires_at <= now) return null
  const idleMilliseconds = now.getTime() - row.last_seen_at.getTime()
  if (idleMilliseconds > IDLE_HOURS * 3_600_000) return null
  if (idleMilliseconds > SEEN_MINUTES * 60_000) {
    await withOrganisationBulk(row.organisation_id, tx => tx`update sessions set last_seen_at = ${now} where organisation_id = ${row.organisation_id} and id = ${row.session_id}`)
  }
  const roles = [...new Set(row.places.map(place => place.role))]
  const shops = [...new Map(row.places.map(({ shopId, name, timeZone }) => [shopId, { id: shopId, name, timeZone }])).values()]
  return {
    organisationId: row.organisation_id,
    sessionId: row.session_id,
    personId: row.person_id,
    roles,
    shopIds: shops.map(shop => shop.id),
    view: {
      person: { id: row.person_id, name: row.person_name, email: row.email },
      organisation: { id: row.organisation_id, name: row.organisation_name, demo: row.demo },
      roles,
      shops,
    },
  }
}

/** Ends one of a person's own sessions from the next request on. @returns false where there is no such session. */
export async function endSession(member: Member, sessionId: string, now: Date): Promise<boolean> {
  const { organisationId, personId } = member
  return withOrganisationBulk(organisationId, async (tx) => {
    const ended = await tx`
      update sessions set revoked_at = ${now} where organisation_id = ${organisationId} and id = ${sessionId} and person_id = ${personId} and revoked_at is null returning id`
    if (ended.length === 0) return false
    await appendAuditEvent(tx, { organisationId, at: now, actor: `person:${personId}`, action: 'session.ended', entityKind: 'session', entityId: sessionId, detail: {} })
    return true
  })
}

/** A person's own sessions that are still open, the latest first. */
export async function listSessions(member: Member, now: Date): Promise<SessionRow[]> {
  const { organisationId, personId } = member
  const rows = await withOrganisationBulk(organisationId, tx => tx<{ id: string, created_at: Date, last_seen_at: Date, user_agent: string }[]>`
    select id, created_at, last_seen_at, user_agent from sessions
    where organisation_id = ${organisationId} and person_id = ${personId} and revoked_at is null and expires_at > ${now}
    order by last_seen_at desc limit 100`)
  return rows.map(row => ({
    id: row.id, createdAt: row.created_at.toISOString(), lastSeenAt: row.last_seen_at.toISOString(), userAgent: row.user_agent, current: row.id === member.sessionId,
  }))
}
