import { withOrganisationBulk } from '../../database/tenancy'

export interface RollupDifference { shopId: string, day: string, declared: string, verdict: string, kept: number, counted: number }

/** Share of a sum by which two additions in another order may differ: far above the rounding of doubles, far below one reading. */
const SUM_TOLERANCE = 1e-9

/**
 * Counts an organisation's readings anew and holds the kept rollups against it; with `repair` the kept
 * ones are replaced in the same transaction.
 *
 * @returns what differed, at most 1,000 rows.
 */
export async function recountRollups(organisationId: string, { repair }: { repair: boolean }): Promise<RollupDifference[]> {
  return withOrganisationBulk(organisationId, async (tx) => {
    // Nobody adds while it is counted.
    if (repair) await tx`lock table reading_rollups in share row exclusive mode`
    await tx`
      create temporary table counted_rollups on commit drop as
      select r.organisation_id, r.shop_id, to_char(r.sampled_at at time zone h.time_zone, 'YYYY-MM-DD') as day, r.declared, r.subject_kind,
        coalesce(r.instrument_id, '00000000-0000-0000-0000-000000000000') as instrument_id, r.verdict, count(*)::int as n,
        sum(r.purity_percent) as purity_sum, sum(r.purity_percent ^ 2) as purity_square_sum, count(r.air_percent)::int as air_n,
        coalesce(sum(r.air_percent), 0) as air_sum, coalesce(sum(r.air_percent ^ 2), 0) as air_square_sum
      from readings r join shops h on h.organisation_id = r.organisation_id and h.id = r.shop_id
      where r.organisation_id = ${organisationId} group by 1, 2, 3, 4, 5, 6, 7`
    const differences = await tx<RollupDifference[]>`
      select shop_id as "shopId", day, declared, verdict, coalesce(kept.n, 0) as kept, coalesce(counted.n, 0) as counted
      from (select * from reading_rollups where organisation_id = ${organisationId} and n <> 0) as kept
      full join counted_rollups counted using (shop_id, day, declared, subject_kind, instrument_id, verdict)
      where kept.n is distinct from counted.n or kept.air_n is distinct from counted.air_n
        or abs(kept.purity_sum - counted.purity_sum) > ${SUM_TOLERANCE} * greatest(1, abs(counted.purity_sum))
        or abs(kept.air_sum - counted.air_sum) > ${SUM_TOLERANCE} * greatest(1, abs(counted.air_sum))
      order by day, shop_id limit 1000`
    if (repair && differences.length > 0) {
      await tx`delete from reading_rollups where organisation_id = ${organisationId}`
      await tx`
        insert into reading_rollups (organisation_id, shop_id, day, declared, subject_kind, instrument_id, verdict, n, purity_sum, purity_square_sum, air_n, air_sum, air_square_sum)
        select * from counted_rollups`
    }
    return [...differences]
  })
}
