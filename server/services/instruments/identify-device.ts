import { withoutOrganisation } from '../../database/tenancy'
import { lookupOf, matches } from './device-token'

export interface Device {
  organisationId: string
  tokenId: string
  shopId: string
  instrumentId: string
  scopes: string[]
}

interface Row { lookup: string, organisation_id: string, token_id: string, digest: Uint8Array, shop_id: string, instrument_id: string, scopes: string[], expires_at: Date | null, revoked: boolean }

let waiting: { lookup: string, resolve: (row: Row | undefined) => void, reject: (error: unknown) => void }[] = []
let scheduled = false

/** Look-ups that arrive in the same turn share one query. Nothing is cached, so a revoked token is refused at its next request. */
function find(lookup: string): Promise<Row | undefined> {
  return new Promise((resolve, reject) => {
    waiting.push({ lookup, resolve, reject })
    if (scheduled) return
    scheduled = true
    setImmediate(async () => {
      const group = waiting
      waiting = []
      scheduled = false
      try {
        const sought = [...new Set(group.map(item => item.lookup))]
        const rows = await withoutOrganisation(client => client<Row[]>`select * from find_device_tokens(${sought}::text[])`)
        const found = new Map(rows.map(row => [row.lookup, row]))
        for (const item of group) item.resolve(found.get(item.lookup))
      } catch (error) {
        for (const item of group) item.reject(error)
      }
    })
  })
}

/** The device behind a bearer token; null for a malformed, unknown, revoked or expired one alike. */
export async function identifyDevice(token: string, now: Date): Promise<Device | null> {
  const lookup = lookupOf(token)
  if (lookup === null) return null
  const row = await find(lookup)
  if (!row || !matches(token, row.digest) || row.revoked || (row.expires_at && row.expires_at <= now)) return null
  return { organisationId: row.organisation_id, tokenId: row.token_id, shopId: row.shop_id, instrumentId: row.instrument_id, scopes: row.scopes }
}
