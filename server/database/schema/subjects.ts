import { sql } from 'drizzle-orm'
import { foreignKey, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { instant, organisationId } from './columns'
import type { Designation } from '#shared/refrigerants/designations'

// What was sampled. Intake makes a subject when it first meets one; people complete it.

export const vehicles = pgTable('vehicles', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  /** Normalised; null where only a plate or a work order was given. */
  vin: text('vin'),
  plate: text('plate'),
  /** Upper case without spaces and hyphens: what plates are matched by. */
  plateKey: text('plate_key'),
  make: text('make'),
  model: text('model'),
  modelYear: integer('model_year'),
  declared: text('declared').$type<Designation>(),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'vehicles_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('vehicles_vin_key').on(t.organisationId, t.vin).where(sql`vin is not null`),
  // A plate alone names a vehicle only until its VIN is known; after that two vehicles may have borne the same plate.
  uniqueIndex('vehicles_plate_key').on(t.organisationId, t.plateKey).where(sql`vin is null and plate_key is not null`),
  index('vehicles_plate_idx').on(t.organisationId, t.plateKey),
])

export const workOrders = pgTable('work_orders', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  shopId: uuid('shop_id').notNull(),
  number: text('number').notNull(),
  vehicleId: uuid('vehicle_id').notNull(),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'work_orders_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('work_orders_number_key').on(t.organisationId, t.shopId, t.number),
  index('work_orders_vehicle_idx').on(t.organisationId, t.vehicleId),
  foreignKey({ name: 'work_orders_vehicle_fkey', columns: [t.organisationId, t.vehicleId], foreignColumns: [vehicles.organisationId, vehicles.id] }),
])

export const cylinders = pgTable('cylinders', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  tag: text('tag').notNull(),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'cylinders_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('cylinders_tag_key').on(t.organisationId, t.tag),
])

export const lots = pgTable('lots', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  number: text('number').notNull(),
  supplier: text('supplier'),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'lots_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('lots_number_key').on(t.organisationId, t.number),
])

export const checkStandards = pgTable('check_standards', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  name: text('name').notNull(),
  /** Assigned mass percentages by substance; null until a certificate is entered. */
  assigned: jsonb('assigned').$type<Record<string, number>>(),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'check_standards_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('check_standards_name_key').on(t.organisationId, t.name),
])
