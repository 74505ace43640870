import { and, eq, gte, ilike, inArray, lt, or, sql, type SQL } from 'drizzle-orm'
import type { ReadingFilters } from '#shared/api/readings'
import { cylinders, checkStandards, lots, vehicles, workOrders } from '../../database/schema/subjects'
import { readingIdentities, readings } from '../../database/schema/readings'
import { shops } from '../../database/schema/organisations'
import type { Transaction } from '../../database/tenancy'
import { identifierKey } from '../ingest/match-subjects'

/** What a person or a token may see: one organisation, some of its shops. */
export interface Scope {
  organisationId: string
  shopIds: string[]
}

/** More subjects than this for one search text means that the text tells nothing. */
const MOST_SUBJECTS = 500

/** In a pattern, `%`, `_` and `\` stand for themselves. */
const literal = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`

/**
 * The conditions of the results browser. Text is looked up among the subjects first, so that the readings
 * are found through their subject's index.
 */
export async function conditionsOf(tx: Transaction, scope: Scope, filters: ReadingFilters): Promise<SQL[]> {
  const { organisationId } = scope
  const shopIds = filters.shop ? scope.shopIds.filter(id => filters.shop!.includes(id)) : scope.shopIds
  const conditions: SQL[] = [eq(readings.organisationId, organisationId), inArray(readings.shopId, shopIds.length > 0 ? shopIds : ['00000000-0000-0000-0000-000000000000'])]
  if (filters.verdict) conditions.push(inArray(readings.verdict, filters.verdict))
  if (filters.declared) conditions.push(inArray(readings.declared, filters.declared))
  if (filters.instrument) conditions.push(inArray(readings.instrumentId, filters.instrument))
  if (filters.subject) conditions.push(inArray(readings.subjectKind, filters.subject))
  if (filters.batch) conditions.push(eq(readings.batch, filters.batch))
  if (filters.from || filters.to) conditions.push(...await dayBounds(tx, scope, shopIds, filters))
  if (filters.submission) {
    const mine = await tx.select({ id: readingIdentities.readingId, at: readingIdentities.sampledAt }).from(readingIdentities)
      .where(and(eq(readingIdentities.organisationId, organisationId), eq(readingIdentities.submissionId, filters.submission)))
      .limit(1000)
    conditions.push(mine.length > 0
      ? and(inArray(readings.id, mine.map(row => row.id)), gte(readings.sampledAt, new Date(Math.min(...mine.map(row => row.at.getTime())))))!
      : sql`false`)
  }
  if (filters.text) conditions.push(await textCondition(tx, organisationId, filters.text))
  return conditions
}

/** Days are those of the shops' zones; where shops of several zones are asked for, from the earliest start to the latest end. */
async function dayBounds(tx: Transaction, { organisationId }: Scope, shopIds: string[], { from, to }: ReadingFilters): Promise<SQL[]> {
  const zones = await tx.selectDistinct({ timeZone: shops.timeZone }).from(shops)
    .where(and(eq(shops.organisationId, organisationId), inArray(shops.id, shopIds.length > 0 ? shopIds : ['00000000-0000-0000-0000-000000000000'])))
  const names = sql`array[${sql.join(zones.map(zone => sql`${zone.timeZone}::text`), sql`, `)}]::text[]`
  const bounds: SQL[] = []
  if (zones.length === 0) return bounds
  if (from) bounds.push(sql`${readings.sampledAt} >= (select min(${from}::date::timestamp at time zone zone) from unnest(${names}) as zone)`)
  if (to) bounds.push(sql`${readings.sampledAt} < (select max((${to}::date + 1)::timestamp at time zone zone) from unnest(${names}) as zone)`)
  return bounds
}

async function textCondition(tx: Transaction, organisationId: string, text: string): Promise<SQL> {
  const pattern = literal(text.trim())
  const key = identifierKey(text)
  const keyPattern = key ? literal(key) : pattern
  const [byVehicle, byOrder, byCylinder, byLot, byStandard] = [
    await tx.select({ id: vehicles.id }).from(vehicles).where(and(eq(vehicles.organisationId, organisationId),
      or(ilike(vehicles.vin, keyPattern), ilike(vehicles.plateKey, keyPattern), ilike(vehicles.make, pattern), ilike(vehicles.model, pattern)))).limit(MOST_SUBJECTS),
    await tx.select({ id: workOrders.id }).from(workOrders).where(and(eq(workOrders.organisationId, organisationId), ilike(workOrders.number, pattern))).limit(MOST_SUBJECTS),
    await tx.select({ id: cylinders.id }).from(cylinders).where(and(eq(cylinders.organisationId, organisationId), ilike(cylinders.tag, pattern))).limit(MOST_SUBJECTS),
    await tx.select({ id: lots.id }).from(lots).where(and(eq(lots.organisationId, organisationId), ilike(lots.number, pattern))).limit(MOST_SUBJECTS),
    await tx.select({ id: checkStandards.id }).from(checkStandards).where(and(eq(checkStandards.organisationId, organisationId), ilike(checkStandards.name, pattern))).limit(MOST_SUBJECTS),
  ]
  const subjectIds = [...byVehicle, ...byCylinder, ...byLot, ...byStandard].map(row => row.id)
  return or(
    subjectIds.length > 0 ? inArray(readings.subjectId, subjectIds) : undefined,
    byOrder.length > 0 ? inArray(readings.workOrderId, byOrder.map(row => row.id)) : undefined,
    and(sql`${readings.note} <> ''`, ilike(readings.note, pattern)),
  )!
}

/** Where a page begins: just below this reading. */
export function below(cursor: { sampledAt: Date, id: string }): SQL {
  // The plain comparison lets the planner leave later partitions out; the pair decides among equal times.
  return and(sql`${readings.sampledAt} <= ${cursor.sampledAt.toISOString()}::timestamptz`,
    or(lt(readings.sampledAt, cursor.sampledAt), and(eq(readings.sampledAt, cursor.sampledAt), lt(readings.id, cursor.id))))!
}
