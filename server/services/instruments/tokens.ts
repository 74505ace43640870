import { and, desc, eq, inArray } from 'drizzle-orm'
import type { DeviceTokenRow } from '#shared/api/session'
import { deviceTokens, instruments } from '../../database/schema/instruments'
import { shops } from '../../database/schema/organisations'
import { withOrganisation, withOrganisationBulk } from '../../database/tenancy'
import { appendAuditEvent } from '../audit/append-event'
import { uuidV7 } from '../ids/uuid-v7'
import type { Scope } from '../readings/reading-filters'
import { issueToken, shownPrefix } from './device-token'

export async function listTokens(scope: Scope): Promise<DeviceTokenRow[]> {
  const rows = await withOrganisation(scope.organisationId, tx => tx
    .select({ token: deviceTokens, serial: instruments.serial, shop: shops.name }).from(deviceTokens)
    .innerJoin(instruments, and(eq(instruments.organisationId, deviceTokens.organisationId), eq(instruments.id, deviceTokens.instrumentId)))
    .innerJoin(shops, and(eq(shops.organisationId, deviceTokens.organisationId), eq(shops.id, deviceTokens.shopId)))
    .where(and(eq(deviceTokens.organisationId, scope.organisationId), inArray(deviceTokens.shopId, scope.shopIds)))
    .orderBy(desc(deviceTokens.createdAt)).limit(500))
  return rows.map(({ token, serial, shop }) => ({
    id: token.id, name: token.name, prefix: shownPrefix(token.lookup), instrument: { id: token.instrumentId, serial }, shop: { id: token.shopId, name: shop },
    createdAt: token.createdAt.toISOString(), lastUsedAt: token.lastUsedAt?.toISOString() ?? null, revokedAt: token.revokedAt?.toISOString() ?? null,
  }))
}

/** Makes a token bound to an instrument of a shop in scope. @returns null where there is no such instrument. */
export async function createToken(scope: Scope, { name, instrumentId, scopes, actor, now }: { name: string, instrumentId: string, scopes: string[], actor: string, now: Date }): Promise<{ token: string, id: string } | null> {
  const { organisationId } = scope
  const issued = issueToken()
  const id = uuidV7(now.getTime())
  return withOrganisationBulk(organisationId, async (tx) => {
    const made = await tx`
      insert into device_tokens (organisation_id, id, name, shop_id, instrument_id, lookup, digest, scopes, created_at)
      select organisation_id, ${id}, ${name}, shop_id, id, ${issued.lookup}, ${issued.digest}, ${scopes}::text[], ${now}
      from instruments where organisation_id = ${organisationId} and id = ${instrumentId} and shop_id = any(${scope.shopIds}::uuid[]) returning id`
    if (made.length === 0) return null
    await appendAuditEvent(tx, { organisationId, at: now, actor, action: 'token.created', entityKind: 'device-token', entityId: id, detail: { name, instrumentId, scopes } })
    return { token: issued.token, id }
  })
}

/** From the next request on the token opens nothing. @returns false where there is no such token. */
export async function revokeToken(scope: Scope, { id, actor, now }: { id: string, actor: string, now: Date }): Promise<boolean> {
  const { organisationId } = scope
  return withOrganisationBulk(organisationId, async (tx) => {
    const revoked = await tx`
      update device_tokens set revoked_at = ${now}
      where organisation_id = ${organisationId} and id = ${id} and shop_id = any(${scope.shopIds}::uuid[]) and revoked_at is null returning id`
    if (revoked.length === 0) return false
    await appendAuditEvent(tx, { organisationId, at: now, actor, action: 'token.revoked', entityKind: 'device-token', entityId: id, detail: {} })
    return true
  })
}
