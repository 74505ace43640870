import { and, asc, eq, inArray, sql } from 'drizzle-orm'
import { instruments } from '../../database/schema/instruments'
import { shops } from '../../database/schema/organisations'
import { withOrganisation } from '../../database/tenancy'
import type { Scope } from './reading-filters'

/** Shops and instruments of the scope, and the batches of the last thousand readings. */
export async function filterChoices({ organisationId, shopIds }: Scope) {
  return withOrganisation(organisationId, async (tx) => {
    const places = await tx.select({ id: shops.id, name: shops.name, timeZone: shops.timeZone }).from(shops)
      .where(and(eq(shops.organisationId, organisationId), inArray(shops.id, shopIds))).orderBy(asc(shops.name))
    const devices = await tx.select({ id: instruments.id, serial: instruments.serial, shopId: instruments.shopId }).from(instruments)
      .where(and(eq(instruments.organisationId, organisationId), inArray(instruments.shopId, shopIds))).orderBy(asc(instruments.serial))
    const recent = await tx.execute<{ batch: string }>(sql`
      select batch from (
        select batch, sampled_at from readings where organisation_id = ${organisationId} and batch is not null
          and shop_id = any(${sql.param(`{${shopIds.join(',')}}`)}::uuid[])
        order by sampled_at desc limit 1000) as latest
      group by batch order by max(sampled_at) desc limit 50`)
    return { shops: places, instruments: devices, batches: recent.map(row => row.batch) }
  })
}
