import type { PurityReading } from '#shared/intake/reading-schema'
import type { BulkTransaction } from '../../database/tenancy'
import { uuidV7 } from '../ids/uuid-v7'

export interface MatchedSubject {
  subjectId: string
  workOrderId: string | null
}

interface Vehicle { id: string, vin: string | null, plate_key: string | null }
interface VehicleSubject { vin: string | null, plate: string | null, plateKey: string | null, workOrder: string | null, declared: string }

/** Upper case without separators: VINs and plates are written in many ways. */
export const identifierKey = (text: string): string => text.toUpperCase().replace(/[\s.\-_/·]/g, '')

function vehicleSubject(reading: PurityReading): VehicleSubject | null {
  if (reading.subject.kind !== 'vehicle') return null
  const { vin, plate, workOrder } = reading.subject
  return {
    vin: vin ? identifierKey(vin) : null,
    plate: plate?.trim() ?? null,
    plateKey: plate ? identifierKey(plate) || null : null,
    workOrder: workOrder?.trim() ?? null,
    declared: reading.declared,
  }
}

/**
 * Finds or makes what each reading was sampled from, set by set: no statement per reading.
 * A vehicle is known by its VIN; without one by its plate, while no vehicle with a VIN makes that
 * ambiguous; without either by its work order. A plate-only vehicle takes the VIN that comes later.
 *
 * @returns one subject for each reading, in the order of `readings`.
 */
export async function matchSubjects(tx: BulkTransaction, organisationId: string, shopId: string, readings: PurityReading[]): Promise<MatchedSubject[]> {
  const vehicles = readings.map(vehicleSubject)
  const [matched, cylinders, lots, standards] = [
    await matchVehicles(tx, organisationId, shopId, vehicles),
    await matchNamed(tx, organisationId, 'cylinders', 'tag', readings.flatMap(r => r.subject.kind === 'cylinder' ? [r.subject.tag.trim()] : [])),
    await matchNamed(tx, organisationId, 'lots', 'number', readings.flatMap(r => r.subject.kind === 'lot' ? [r.subject.number.trim()] : [])),
    await matchNamed(tx, organisationId, 'check_standards', 'name', readings.flatMap(r => r.subject.kind === 'check' ? [r.subject.standard.trim()] : [])),
  ]
  return readings.map((reading, i) => {
    const { subject } = reading
    switch (subject.kind) {
      case 'vehicle': return matched[i]!
      case 'cylinder': return { subjectId: cylinders.get(subject.tag.trim())!, workOrderId: null }
      case 'lot': return { subjectId: lots.get(subject.number.trim())!, workOrderId: null }
      case 'check': return { subjectId: standards.get(subject.standard.trim())!, workOrderId: null }
    }
  })
}

/** Cylinders, lots and check standards: one name, one row. */
async function matchNamed(tx: BulkTransaction, organisationId: string, table: string, column: string, names: string[]): Promise<Map<string, string>> {
  const wanted = [...new Set(names)].sort()
  const found = new Map<string, string>()
  if (wanted.length === 0) return found
  const look = async () => {
    const rows = await tx<{ id: string, name: string }[]>`
      select id, ${tx(column)} as name from ${tx(table)} where organisation_id = ${organisationId} and ${tx(column)} = any(${wanted}::text[])`
    for (const row of rows) found.set(row.name, row.id)
  }
  await look()
  const missing = wanted.filter(name => !found.has(name))
  if (missing.length > 0) {
    const ids = missing.map(() => uuidV7(Date.now()))
    await tx`
      insert into ${tx(table)} (organisation_id, id, ${tx(column)})
      select ${organisationId}, * from unnest(${ids}::uuid[], ${missing}::text[]) on conflict do nothing`
    await look()
  }
  return found
}

async function matchVehicles(tx: BulkTransaction, organisationId: string, shopId: string, subjects: (VehicleSubject | null)[]): Promise<(MatchedSubject | null)[]> {
  const known = subjects.filter(subject => subject !== null)
  if (known.length === 0) return subjects.map(() => null)
  const book = new VehicleBook(organisationId, shopId)
  await book.look(tx, known)
  const missing = known.filter(subject => !book.has(subject))
  if (missing.length > 0) {
    // Take the lock under which this organisation's vehicles are made, look again for what was missing, then make it.
    await tx`select pg_advisory_xact_lock(hashtextextended(${`coldslip vehicles ${organisationId}`}, 0))`
    await book.look(tx, missing)
    await book.makeMissing(tx, missing.filter(subject => !book.has(subject)))
  }
  return subjects.map(subject => subject && book.find(subject))
}

/** The vehicles and work orders that a set of readings may mean, in memory. */
class VehicleBook {
  private byVin = new Map<string, string>()
  private byPlateAlone = new Map<string, string>()
  private byPlate = new Map<string, string[]>()
  private orders = new Map<string, { id: string, vehicleId: string }>()

  constructor(private organisationId: string, private shopId: string) {}

  async look(tx: BulkTransaction, subjects: VehicleSubject[]): Promise<void> {
    const vins = [...new Set(subjects.flatMap(s => s.vin ? [s.vin] : []))]
    const plates = [...new Set(subjects.flatMap(s => s.plateKey ? [s.plateKey] : []))]
    const numbers = [...new Set(subjects.flatMap(s => s.workOrder ? [s.workOrder] : []))]
    const [byVin, byPlate, orders] = await Promise.all([
      vins.length === 0 ? [] : tx<Vehicle[]>`
        select v.id, v.vin, v.plate_key from unnest(${vins}::text[]) as wanted(vin)
        join vehicles v on v.organisation_id = ${this.organisationId} and v.vin = wanted.vin`,
      plates.length === 0 ? [] : tx<Vehicle[]>`
        select v.id, v.vin, v.plate_key from unnest(${plates}::text[]) as wanted(plate_key)
        join vehicles v on v.organisation_id = ${this.organisationId} and v.plate_key = wanted.plate_key`,
      numbers.length === 0 ? [] : tx<{ id: string, number: string, vehicle_id: string }[]>`
        select w.id, w.number, w.vehicle_id from unnest(${numbers}::text[]) as wanted(number)
        join work_orders w on w.organisation_id = ${this.organisationId} and w.shop_id = ${this.shopId} and w.number = wanted.number`,
    ])
    for (const vehicle of [...byVin, ...byPlate]) this.add(vehicle)
    for (const order of orders) this.orders.set(order.number, { id: order.id, vehicleId: order.vehicle_id })
  }

  private add({ id, vin, plate_key: plateKey }: Vehicle): void {
    if (vin) this.byVin.set(vin, id)
    if (!plateKey) return
    if (!vin) this.byPlateAlone.set(plateKey, id)
    const bearing = this.byPlate.get(plateKey)
    if (!bearing) this.byPlate.set(plateKey, [id])
    else if (!bearing.includes(id)) bearing.push(id)
  }

  private vehicleOf(subject: VehicleSubject): string | null {
    if (subject.vin) return this.byVin.get(subject.vin) ?? null
    if (subject.plateKey) {
      const bearing = this.byPlate.get(subject.plateKey)
      return this.byPlateAlone.get(subject.plateKey) ?? (bearing?.length === 1 ? bearing[0]! : null)
    }
    return subject.workOrder ? this.orders.get(subject.workOrder)?.vehicleId ?? null : null
  }

  find(subject: VehicleSubject): MatchedSubject {
    return { subjectId: this.vehicleOf(subject)!, workOrderId: subject.workOrder ? this.orders.get(subject.workOrder)!.id : null }
  }

  has(subject: VehicleSubject): boolean {
    return this.vehicleOf(subject) !== null && (!subject.workOrder || this.orders.has(subject.workOrder))
  }

  async makeMissing(tx: BulkTransaction, subjects: VehicleSubject[]): Promise<void> {
    const vehicles: (VehicleSubject & { id: string })[] = []
    const adopted: { id: string, vin: string }[] = []
    const orders: { id: string, number: string, vehicleId: string }[] = []
    for (const subject of subjects) {
      let vehicleId = this.vehicleOf(subject)
      const plateAlone = subject.vin && subject.plateKey ? this.byPlateAlone.get(subject.plateKey) : undefined
      if (vehicleId === null && plateAlone) {
        vehicleId = plateAlone
        adopted.push({ id: plateAlone, vin: subject.vin! })
        this.byPlateAlone.delete(subject.plateKey!)
        this.byVin.set(subject.vin!, plateAlone)
      }
      if (vehicleId === null) {
        vehicleId = uuidV7(Date.now())
        vehicles.push({ ...subject, id: vehicleId })
        this.add({ id: vehicleId, vin: subject.vin, plate_key: subject.plateKey })
      }
      if (subject.workOrder && !this.orders.has(subject.workOrder)) {
        const order = { id: uuidV7(Date.now()), vehicleId }
        this.orders.set(subject.workOrder, order)
        orders.push({ ...order, number: subject.workOrder })
      }
    }
    if (vehicles.length > 0) {
      await tx`
        insert into vehicles (organisation_id, id, vin, plate, plate_key, declared)
        select ${this.organisationId}, * from unnest(${vehicles.map(v => v.id)}::uuid[], ${vehicles.map(v => v.vin)}::text[], ${vehicles.map(v => v.plate)}::text[],
          ${vehicles.map(v => v.plateKey)}::text[], ${vehicles.map(v => v.declared)}::text[])`
    }
    if (adopted.length > 0) {
      await tx`
        update vehicles set vin = given.vin from unnest(${adopted.map(a => a.id)}::uuid[], ${adopted.map(a => a.vin)}::text[]) as given(id, vin)
        where vehicles.organisation_id = ${this.organisationId} and vehicles.id = given.id`
    }
    if (orders.length > 0) {
      await tx`
        insert into work_orders (organisation_id, id, shop_id, number, vehicle_id)
        select ${this.organisationId}, given.id, ${this.shopId}, given.number, given.vehicle_id
        from unnest(${orders.map(o => o.id)}::uuid[], ${orders.map(o => o.number)}::text[], ${orders.map(o => o.vehicleId)}::uuid[]) as given(id, number, vehicle_id)`
    }
  }
}
