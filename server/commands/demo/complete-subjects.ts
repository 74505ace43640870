import type { DemoOrganisation } from '#fixtures/demo/types'
import { withOrganisationBulk } from '#server/database/tenancy'
import { appendAuditEvent } from '#server/services/audit/append-event'

/** Intake makes a subject from what a reading says; this adds what people would have entered: make and model, plate, supplier, certificate. */
export async function completeSubjects(organisationId: string, { vehicles, lots, checkStandards }: DemoOrganisation, now: Date): Promise<void> {
  await withOrganisationBulk(organisationId, async (tx) => {
    const vins = vehicles.map(vehicle => vehicle.vin)
    await tx`
      update vehicles set make = given.make, model = given.model, model_year = given.model_year,
        plate = coalesce(vehicles.plate, given.plate), plate_key = coalesce(vehicles.plate_key, replace(given.plate, ' ', ''))
      from unnest(${vins}::text[], ${vehicles.map(v => v.plate)}::text[], ${vehicles.map(v => v.make)}::text[], ${vehicles.map(v => v.model)}::text[], ${vehicles.map(v => v.modelYear)}::int[])
        as given(vin, plate, make, model, model_year)
      where vehicles.organisation_id = ${organisationId} and vehicles.vin = given.vin`
    // Of a few only the plate was ever sent.
    await tx`
      update vehicles set make = given.make, model = given.model, model_year = given.model_year
      from unnest(${vehicles.map(v => v.plate)}::text[], ${vehicles.map(v => v.make)}::text[], ${vehicles.map(v => v.model)}::text[], ${vehicles.map(v => v.modelYear)}::int[])
        as given(plate, make, model, model_year)
      where vehicles.organisation_id = ${organisationId} and vehicles.vin is null and vehicles.plate = given.plate`
    await tx`
      update lots set supplier = given.supplier from unnest(${lots.map(lot => lot.number)}::text[], ${lots.map(lot => lot.supplier)}::text[]) as given(number, supplier)
      where lots.organisation_id = ${organisationId} and lots.number = given.number`
    for (const { name, assigned } of checkStandards) {
      await tx`update check_standards set assigned = ${tx.json(assigned)} where organisation_id = ${organisationId} and name = ${name}`
    }
    await appendAuditEvent(tx, {
      organisationId, at: now, actor: 'system', action: 'demo.completed', entityKind: 'organisation', entityId: organisationId,
      detail: { vehicles: vehicles.length, lots: lots.length, checkStandards: checkStandards.length },
    })
  })
}
