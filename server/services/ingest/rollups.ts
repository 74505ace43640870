import type { SubjectKind } from '#shared/intake/kinds'
import type { VerdictKind } from '#shared/verdict/types'
import type { BulkTransaction } from '../../database/tenancy'

export interface RollupEntry {
  sampledAt: Date
  declared: string
  subjectKind: SubjectKind
  instrumentId: string
  verdict: VerdictKind
  purityPercent: number
  airPercent: number | null
}

interface Sums { day: string, entry: RollupEntry, n: number, purity: number, puritySquare: number, airN: number, air: number, airSquare: number }

const formats = new Map<string, Intl.DateTimeFormat>()

/** The calendar day of an instant in an IANA zone, `YYYY-MM-DD`. */
export function dayIn(timeZone: string, at: Date): string {
  let format = formats.get(timeZone)
  if (!format) formats.set(timeZone, format = new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }))
  return format.format(at)
}

/** Adds new readings to the counts and sums of their day, in the transaction that writes them. */
export async function addToRollups(tx: BulkTransaction, { organisationId, shopId, timeZone }: { organisationId: string, shopId: string, timeZone: string }, entries: RollupEntry[]): Promise<void> {
  const sums = new Map<string, Sums>()
  const days = new Map<number, string>()
  for (const entry of entries) {
    // A zone's day changes on a quarter of an hour at the finest, so one look-up serves all instants of it.
    const quarter = Math.floor(entry.sampledAt.getTime() / 900_000)
    let day = days.get(quarter)
    if (day === undefined) days.set(quarter, day = dayIn(timeZone, entry.sampledAt))
    const key = `${day} ${entry.declared} ${entry.subjectKind} ${entry.instrumentId} ${entry.verdict}`
    let sum = sums.get(key)
    if (!sum) sums.set(key, sum = { day, entry, n: 0, purity: 0, puritySquare: 0, airN: 0, air: 0, airSquare: 0 })
    sum.n++
    sum.purity += entry.purityPercent
    sum.puritySquare += entry.purityPercent ** 2
    if (entry.airPercent !== null) {
      sum.airN++
      sum.air += entry.airPercent
      sum.airSquare += entry.airPercent ** 2
    }
  }
  // Always in the same order, so that two transactions that touch the same days can't lock each other out.
  const rows = [...sums.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, sum]) => sum)
  await tx`
    insert into reading_rollups as r (organisation_id, shop_id, day, declared, subject_kind, instrument_id, verdict, n, purity_sum, purity_square_sum, air_n, air_sum, air_square_sum)
    select ${organisationId}, ${shopId}, given.* from unnest(
      ${rows.map(s => s.day)}::text[], ${rows.map(s => s.entry.declared)}::text[], ${rows.map(s => s.entry.subjectKind)}::text[],
      ${rows.map(s => s.entry.instrumentId)}::uuid[], ${rows.map(s => s.entry.verdict)}::text[], ${rows.map(s => s.n)}::int[],
      ${rows.map(s => s.purity)}::float8[], ${rows.map(s => s.puritySquare)}::float8[], ${rows.map(s => s.airN)}::int[],
      ${rows.map(s => s.air)}::float8[], ${rows.map(s => s.airSquare)}::float8[]) as given
    on conflict (organisation_id, shop_id, day, declared, subject_kind, instrument_id, verdict) do update set
      n = r.n + excluded.n, purity_sum = r.purity_sum + excluded.purity_sum, purity_square_sum = r.purity_square_sum + excluded.purity_square_sum,
      air_n = r.air_n + excluded.air_n, air_sum = r.air_sum + excluded.air_sum, air_square_sum = r.air_square_sum + excluded.air_square_sum`
}
