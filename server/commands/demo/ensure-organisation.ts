import type postgres from 'postgres'
import type { DemoOrganisation } from '#fixtures/demo/types'
import { createOrganisation } from '#server/services/accounts/create-organisation'

/** A demo organisation with the ids that the database gave its shops, instruments and people. */
export interface LoadedOrganisation {
  organisationId: string
  shopIds: ReadonlyMap<string, string>
  /** By serial. */
  instrumentIds: ReadonlyMap<string, string>
  /** By e-mail address. */
  personIds: ReadonlyMap<string, string>
}

/** Makes the organisation unless an earlier run did. */
export async function ensureOrganisation(owner: postgres.Sql, given: DemoOrganisation, { since, now }: { since: Date, now: Date }): Promise<LoadedOrganisation> {
  const [found] = await owner<{ id: string }[]>`select organisation_id as id from organisations where demo and name = ${given.name}`
  const organisationId = found?.id ?? (await createOrganisation({ ...given, demo: true, since }, now)).organisationId
  const [shops, instruments, people] = await Promise.all([
    owner<{ id: string, name: string }[]>`select id, name from shops where organisation_id = ${organisationId}`,
    owner<{ id: string, name: string }[]>`select id, serial as name from instruments where organisation_id = ${organisationId}`,
    owner<{ id: string, name: string }[]>`select id, email as name from people where organisation_id = ${organisationId}`,
  ])
  const byName = (rows: { id: string, name: string }[]) => new Map(rows.map(({ id, name }) => [name, id]))
  return { organisationId, shopIds: byName(shops), instrumentIds: byName(instruments), personIds: byName(people) }
}
