import { withOrganisationBulk } from '../../database/tenancy'
import type { Device } from './identify-device'

/** One write a minute and token is exact enough for "last used", and costs a busy device nothing. */
const EVERY_MILLISECONDS = 60_000
const MOST_TOKENS = 10_000

const noted = new Map<string, number>()

/** Writes down when the token was used, unless this process did so within the last minute. */
export async function noteUse({ organisationId, tokenId }: Device, now: Date): Promise<void> {
  const time = now.getTime()
  if (time - (noted.get(tokenId) ?? 0) < EVERY_MILLISECONDS) return
  if (noted.size >= MOST_TOKENS) noted.clear()
  noted.set(tokenId, time)
  await withOrganisationBulk(organisationId, tx => tx`
    update device_tokens set last_used_at = ${now}
    where organisation_id = ${organisationId} and id = ${tokenId} and (last_used_at is null or last_used_at < ${now})`)
}
