import { and, desc, eq, getTableColumns, sql, type SQL } from 'drizzle-orm'
import type { ReadingRow } from '#shared/api/readings'
import { instruments } from '../../database/schema/instruments'
import { shops } from '../../database/schema/organisations'
import { readings } from '../../database/schema/readings'
import { checkStandards, cylinders, lots, vehicles, workOrders } from '../../database/schema/subjects'
import type { Transaction } from '../../database/tenancy'

export type StoredReading = typeof readings.$inferSelect

/** One page of whole readings, newest first. The page is cut before anything is joined to it. */
export async function selectReadings(tx: Transaction, conditions: SQL[], limit: number): Promise<{ row: ReadingRow, stored: StoredReading }[]> {
  const page = tx.select().from(readings).where(and(...conditions)).orderBy(desc(readings.sampledAt), desc(readings.id)).limit(limit).as('page')
  const rows = await tx.select({
    page: pageColumns(page),
    shopName: shops.name,
    timeZone: shops.timeZone,
    serial: instruments.serial,
    vin: vehicles.vin,
    plate: vehicles.plate,
    order: workOrders.number,
    name: sql<string | null>`coalesce(${cylinders.tag}, ${lots.number}, ${checkStandards.name})`,
  }).from(page)
    .innerJoin(shops, and(eq(shops.organisationId, page.organisationId), eq(shops.id, page.shopId)))
    .leftJoin(instruments, and(eq(instruments.organisationId, page.organisationId), eq(instruments.id, page.instrumentId)))
    .leftJoin(vehicles, and(eq(page.subjectKind, 'vehicle'), eq(vehicles.organisationId, page.organisationId), eq(vehicles.id, page.subjectId)))
    .leftJoin(workOrders, and(eq(workOrders.organisationId, page.organisationId), eq(workOrders.id, page.workOrderId)))
    .leftJoin(cylinders, and(eq(page.subjectKind, 'cylinder'), eq(cylinders.organisationId, page.organisationId), eq(cylinders.id, page.subjectId)))
    .leftJoin(lots, and(eq(page.subjectKind, 'lot'), eq(lots.organisationId, page.organisationId), eq(lots.id, page.subjectId)))
    .leftJoin(checkStandards, and(eq(page.subjectKind, 'check'), eq(checkStandards.organisationId, page.organisationId), eq(checkStandards.id, page.subjectId)))
    .orderBy(desc(page.sampledAt), desc(page.id))
  return rows.map(({ page: stored, ...joined }) => ({ stored, row: rowOf(stored, joined) }))
}

type Page = { [Name in keyof StoredReading]: unknown } & Record<string, never>

/** All columns of the cut page, under the names of the table. */
function pageColumns(page: unknown): typeof readings._.columns {
  return Object.fromEntries(Object.keys(getTableColumns(readings)).map(name => [name, (page as Page)[name]])) as unknown as typeof readings._.columns
}

function rowOf(stored: StoredReading, joined: { shopName: string, timeZone: string, serial: string | null, vin: string | null, plate: string | null, order: string | null, name: string | null }): ReadingRow {
  return {
    id: stored.id,
    sampledAt: stored.sampledAt.toISOString(),
    receivedAt: stored.receivedAt.toISOString(),
    shop: { id: stored.shopId, name: joined.shopName, timeZone: joined.timeZone },
    instrument: stored.instrumentId && joined.serial ? { id: stored.instrumentId, serial: joined.serial } : null,
    subject: {
      kind: stored.subjectKind,
      id: stored.subjectId,
      label: joined.name ?? joined.plate ?? joined.vin ?? joined.order ?? '',
      vin: joined.vin,
      plate: joined.plate,
      workOrder: joined.order,
    },
    declared: stored.declared,
    verdict: stored.verdict,
    decidedBy: stored.decidedBy,
    decidedBySubstance: stored.decidedBySubstance,
    purityPercent: stored.purityPercent,
    purityUncertainty: stored.purityUncertainty,
    contaminants: stored.contaminants,
    airPercent: stored.airPercent,
    resolution: stored.resolution,
    attempt: stored.attempt,
    flags: stored.flags,
    batch: stored.batch,
    source: stored.source,
    revision: stored.revision,
  }
}

