import type { Role } from '#shared/access/roles'
import type { InstrumentUncertainty } from '#shared/verdict/types'
import { defaultLimitSet } from '#shared/verdict/limits'
import { withOrganisationBulk, type BulkTransaction } from '../../database/tenancy'
import { appendAuditEvent } from '../audit/append-event'
import { uuidV7 } from '../ids/uuid-v7'
import { hashPassword } from './passwords'

export interface NewShop { name: string, timeZone: string }

export interface NewPerson {
  name: string
  email: string
  password: string
  certification?: string
  /** Names of shops, with the role there. */
  places: { shop: string, role: Role }[]
}

export interface NewInstrument {
  serial: string
  model: string
  shop: string
  uncertainty: InstrumentUncertainty
  calibrationDueAt: Date | null
  filterChangedAt: Date | null
  filterLifeSamples: number | null
  ambientMinimumCelsius: number
  ambientMaximumCelsius: number
  warmUpSeconds: number
  zeroSeconds: number
  sampleSeconds: number
}

export interface NewOrganisation {
  name: string
  demo: boolean
  /** From when the first limit set holds. */
  since: Date
  shops: NewShop[]
  people: NewPerson[]
  instruments: NewInstrument[]
}

export interface CreatedOrganisation {
  organisationId: string
  shopIds: Map<string, string>
  instrumentIds: Map<string, string>
}

/** Sets an organisation up: shops, people with their roles, instruments, and the default limits as version 1. */
export async function createOrganisation(given: NewOrganisation, now: Date): Promise<CreatedOrganisation> {
  const organisationId = uuidV7(now.getTime())
  const shopIds = new Map(given.shops.map(shop => [shop.name, uuidV7(now.getTime())]))
  const instrumentIds = new Map(given.instruments.map(instrument => [instrument.serial, uuidV7(now.getTime())]))
  const hashes = await Promise.all(given.people.map(person => hashPassword(person.password)))
  await withOrganisationBulk(organisationId, async (tx) => {
    await tx`insert into organisations (organisation_id, name, demo) values (${organisationId}, ${given.name}, ${given.demo})`
    await tx`insert into shops ${tx(given.shops.map(shop => ({ organisation_id: organisationId, id: shopIds.get(shop.name)!, name: shop.name, time_zone: shop.timeZone })))}`
    await insertPeople(tx, organisationId, given.people, hashes, shopIds, now)
    if (given.instruments.length > 0) await insertInstruments(tx, organisationId, given.instruments, shopIds, instrumentIds)
    const limits = { ...defaultLimitSet(), effectiveFrom: given.since.toISOString() }
    await tx`insert into limit_sets (organisation_id, version, content, effective_from) values (${organisationId}, ${limits.version}, ${tx.json(limits as never)}, ${given.since})`
    await appendAuditEvent(tx, {
      organisationId, at: now, actor: 'system', action: 'organisation.created', entityKind: 'organisation', entityId: organisationId,
      detail: { name: given.name, shops: given.shops.length, people: given.people.length, instruments: given.instruments.length },
    })
  })
  return { organisationId, shopIds, instrumentIds }
}

async function insertPeople(tx: BulkTransaction, organisationId: string, people: NewPerson[], hashes: string[], shopIds: Map<string, string>, now: Date): Promise<void> {
  if (people.length === 0) return
  const rows = people.map((person, i) => ({ organisation_id: organisationId, id: uuidV7(now.getTime()), email: person.email.toLowerCase(), name: person.name, password_hash: hashes[i]!, certification: person.certification ?? null }))
  await tx`insert into people ${tx(rows)}`
  const places = people.flatMap((person, i) => person.places.map(({ shop, role }) => ({ organisation_id: organisationId, person_id: rows[i]!.id, shop_id: shopIds.get(shop)!, role })))
  await tx`insert into memberships ${tx(places)}`
}

async function insertInstruments(tx: BulkTransaction, organisationId: string, instruments: NewInstrument[], shopIds: Map<string, string>, ids: Map<string, string>): Promise<void> {
  for (const instrument of instruments) {
    await tx`
      insert into instruments (organisation_id, id, shop_id, serial, model, uncertainty, calibration_due_at, filter_changed_at, filter_life_samples,
        ambient_minimum_celsius, ambient_maximum_celsius, warm_up_seconds, zero_seconds, sample_seconds)
      values (${organisationId}, ${ids.get(instrument.serial)!}, ${shopIds.get(instrument.shop)!}, ${instrument.serial}, ${instrument.model}, ${tx.json(instrument.uncertainty as never)},
        ${instrument.calibrationDueAt}, ${instrument.filterChangedAt}, ${instrument.filterLifeSamples}, ${instrument.ambientMinimumCelsius}, ${instrument.ambientMaximumCelsius},
        ${instrument.warmUpSeconds}, ${instrument.zeroSeconds}, ${instrument.sampleSeconds})`
  }
}
