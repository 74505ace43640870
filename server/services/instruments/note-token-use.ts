import { withOrganisationBulk } from '../../database/tenancy'
import type { Device } from './identify-device'

/** A write at every request would cost more than the request. */
const NOTED_EVERY_MILLISECONDS = 60_000
const noted = new Map<string, number>()

/** Keeps when a token was last used, to the minute; does not hold up the answer, and a failure is made up for by the next use. */
export function noteTokenUse({ organisationId, tokenId }: Device): void {
  const now = Date.now()
  if (now - (noted.get(tokenId) ?? 0) < NOTED_EVERY_MILLISECONDS) return
  noted.set(tokenId, now)
  withOrganisationBulk(organisationId, tx => tx`update device_tokens set last_used_at = now() where organisation_id = ${organisationId} and id = ${tokenId}`)
    .catch(() => noted.delete(tokenId))
}
