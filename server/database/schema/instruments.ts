import { boolean, doublePrecision, foreignKey, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'
import { shops } from './organisations'
import type { InstrumentUncertainty } from '#shared/verdict/types'

export const instruments = pgTable('instruments', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  shopId: uuid('shop_id').notNull(),
  serial: text('serial').notNull(),
  model: text('model').notNull().default(''),
  /** Standard uncertainties per component from the certificate. */
  uncertainty: jsonb('uncertainty').$type<InstrumentUncertainty>().notNull(),
  /** True until a certificate's values were entered: the record was made from a first reading. */
  provisional: boolean('provisional').notNull().default(false),
  calibrationDueAt: instant('calibration_due_at'),
  filterChangedAt: instant('filter_changed_at'),
  /** Samples a filter serves; null: the maker states none. */
  filterLifeSamples: integer('filter_life_samples'),
  ambientMinimumCelsius: doublePrecision('ambient_minimum_celsius').notNull().default(10),
  ambientMaximumCelsius: doublePrecision('ambient_maximum_celsius').notNull().default(49),
  /** Readings sampled from here on are marked until the instrument is put right. */
  outOfControlSince: instant('out_of_control_since'),
  warmUpSeconds: integer('warm_up_seconds').notNull().default(60),
  zeroSeconds: integer('zero_seconds').notNull().default(20),
  sampleSeconds: integer('sample_seconds').notNull().default(60),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'instruments_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('instruments_serial_key').on(t.organisationId, t.serial),
  foreignKey({ name: 'instruments_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])

/** A device's token: shown once, kept as a digest, bound to an instrument. */
export const deviceTokens = pgTable('device_tokens', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  name: text('name').notNull(),
  shopId: uuid('shop_id').notNull(),
  instrumentId: uuid('instrument_id').notNull(),
  /** The part of the token that finds the row; not secret. */
  lookup: text('lookup').notNull(),
  digest: bytea('digest').notNull(),
  /** What it may do: `intake`, `read`. */
  scopes: text('scopes').array().notNull(),
  createdAt: instant('created_at').notNull().defaultNow(),
  expiresAt: instant('expires_at'),
  revokedAt: instant('revoked_at'),
  lastUsedAt: instant('last_used_at'),
}, t => [
  primaryKey({ name: 'device_tokens_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('device_tokens_lookup_key').on(t.lookup),
  foreignKey({ name: 'device_tokens_instrument_fkey', columns: [t.organisationId, t.instrumentId], foreignColumns: [instruments.organisationId, instruments.id] }),
  foreignKey({ name: 'device_tokens_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])
