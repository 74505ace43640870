import { withoutOrganisation } from '../../database/tenancy'

/** Makes the partitions of last month to three months ahead, so that a reading seldom waits for one. */
export async function makePartitionsAhead(): Promise<void> {
  await withoutOrganisation(client => client`
    select ensure_reading_partition((now() + make_interval(months => m))::date) from generate_series(-1, 3) as m`)
}
