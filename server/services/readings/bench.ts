import { and, eq, gte, inArray, lt, sql } from 'drizzle-orm'
import type { BenchView } from '#shared/api/bench'
import { VERDICTS, type VerdictKind } from '#shared/verdict/types'
import { readings } from '../../database/schema/readings'
import { withOrganisation, type Transaction } from '../../database/tenancy'
import { listOpenSubmissions } from '../ingest/list-submissions'
import { conditionsOf, type Scope } from './reading-filters'
import { selectReadings } from './readings.queries'

/** Today's work: what came in, what waits, what alarms. `timeZone` tells where today begins. */
export async function benchView(scope: Scope, { shopIds, timeZone, now }: { shopIds: string[], timeZone: string, now: Date }): Promise<BenchView> {
  const inShops = { ...scope, shopIds }
  return withOrganisation(scope.organisationId, async (tx) => {
    const dayStart = await startOfDay(tx, timeZone, now)
    const base = await conditionsOf(tx, inShops, {})
    const since = (at: Date) => gte(readings.sampledAt, at)
    const counts = await tx.select({ verdict: readings.verdict, n: sql<number>`count(*)::int` }).from(readings)
      .where(and(...base, since(dayStart), lt(readings.sampledAt, new Date(dayStart.getTime() + 86_400_000)))).groupBy(readings.verdict)
    const weekAgo = new Date(now.getTime() - 7 * 86_400_000)
    const [latest, alarms, again] = [
      await selectReadings(tx, base, 30),
      await selectReadings(tx, [...base, since(weekAgo), inArray(readings.verdict, ['isolate', 'isolate-flammable']), unanswered(inArray(sql`later.verdict`, ['connect', 'connect-purge-air']))], 20),
      await selectReadings(tx, [...base, since(new Date(now.getTime() - 86_400_000)), eq(readings.verdict, 'sample-again'), unanswered(sql`true`)], 20),
    ]
    return {
      dayStart: dayStart.toISOString(),
      counts: Object.fromEntries(VERDICTS.map(kind => [kind, counts.find(count => count.verdict === kind)?.n ?? 0])) as Record<VerdictKind, number>,
      latest: latest.map(({ row }) => row),
      alarms: alarms.map(({ row }) => row),
      again: again.map(({ row }) => row),
      waiting: await listOpenSubmissions(tx, inShops),
    }
  })
}

/** No later sample of the same subject that settles the matter. */
function unanswered(settles: ReturnType<typeof sql>) {
  return sql`not exists (
    select 1 from ${readings} as later
    where later.organisation_id = ${readings.organisationId} and later.subject_id = ${readings.subjectId}
      and later.sampled_at > ${readings.sampledAt} and ${settles})`
}

async function startOfDay(tx: Transaction, timeZone: string, now: Date): Promise<Date> {
  const [row] = await tx.execute<{ at: string }>(sql`
    select to_char((date_trunc('day', ${now.toISOString()}::timestamptz at time zone ${timeZone}) at time zone ${timeZone}) at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"') as at`)
  return new Date(row!.at)
}
