import type { InstrumentUncertainty, LimitSet } from '#shared/verdict/types'
import type { BulkTransaction } from '../../database/tenancy'
import { uuidV7 } from '../ids/uuid-v7'

export interface InstrumentRecord {
  id: string
  serial: string
  uncertainty: InstrumentUncertainty
  provisional: boolean
  calibrationDueAt: Date | null
  filterChangedAt: Date | null
  filterLifeSamples: number | null
  ambientMinimumCelsius: number
  ambientMaximumCelsius: number
  outOfControlSince: Date | null
  /** Samples since the filter was changed, as far as they are recorded. */
  samplesOnFilter: number
}

/** Until a certificate's values are entered: half a percent, more than a sound instrument has; common practice, no source. */
export const PROVISIONAL_UNCERTAINTY: InstrumentUncertainty = { default: { absolutePercent: 0.5, relative: 0 } }

/** The instruments by serial; one that nobody knows yet gets a provisional record, so that no reading is turned away for it. */
export async function instrumentsBySerial(tx: BulkTransaction, organisationId: string, shopId: string, serials: string[]): Promise<Map<string, InstrumentRecord>> {
  const wanted = [...new Set(serials)].sort()
  const look = () => tx<InstrumentRecord[]>`
    select i.id, i.serial, i.uncertainty, i.provisional, i.calibration_due_at as "calibrationDueAt", i.filter_changed_at as "filterChangedAt",
           i.filter_life_samples as "filterLifeSamples", i.ambient_minimum_celsius as "ambientMinimumCelsius",
           i.ambient_maximum_celsius as "ambientMaximumCelsius", i.out_of_control_since as "outOfControlSince",
           case when i.filter_life_samples is null or i.filter_changed_at is null then 0 else (
             select count(*)::int from (
               select 1 from readings r where r.organisation_id = i.organisation_id and r.instrument_id = i.id and r.sampled_at >= i.filter_changed_at
               limit i.filter_life_samples) as used) end as "samplesOnFilter"
    from instruments i where i.organisation_id = ${organisationId} and i.serial = any(${wanted}::text[])`
  let rows = await look()
  if (rows.length < wanted.length) {
    const known = new Set(rows.map(row => row.serial))
    const missing = wanted.filter(serial => !known.has(serial))
    await tx`
      insert into instruments (organisation_id, id, shop_id, serial, uncertainty, provisional)
      select ${organisationId}, given.id, ${shopId}, given.serial, ${tx.json(PROVISIONAL_UNCERTAINTY as never)}, true
      from unnest(${missing.map(() => uuidV7(Date.now()))}::uuid[], ${missing}::text[]) as given(id, serial)
      on conflict do nothing`
    rows = await look()
  }
  return new Map(rows.map(row => [row.serial, row]))
}

export interface LimitSetVersion { version: number, effectiveFrom: Date, content: LimitSet }

/** All versions, oldest first. */
export async function limitSetVersions(tx: BulkTransaction, organisationId: string): Promise<LimitSetVersion[]> {
  return tx<LimitSetVersion[]>`
    select version, effective_from as "effectiveFrom", content from limit_sets
    where organisation_id = ${organisationId} order by effective_from, version`
}

/** The limits in force when the sample was taken; before the first version, the first. */
export function limitsInForce(versions: LimitSetVersion[], at: Date): LimitSet {
  let found = versions[0]
  for (const version of versions) if (version.effectiveFrom <= at) found = version
  if (!found) throw new Error('The organisation has no limit set')
  return found.content
}
