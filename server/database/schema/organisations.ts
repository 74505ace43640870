import { boolean, foreignKey, index, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'
import type { Role } from '#shared/access/roles'

export const organisations = pgTable('organisations', {
  organisationId: organisationId().primaryKey(),
  name: text('name').notNull(),
  /** Invented data: its accounts are refused on any address but loopback. */
  demo: boolean('demo').notNull().default(false),
  createdAt: instant('created_at').notNull().defaultNow(),
})

export const shops = pgTable('shops', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  name: text('name').notNull(),
  /** IANA zone, for display and for the day a reading counts under. */
  timeZone: text('time_zone').notNull(),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [primaryKey({ name: 'shops_pkey', columns: [t.organisationId, t.id] })])

export const people = pgTable('people', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  email: text('email').notNull(),
  name: text('name').notNull(),
  passwordHash: text('password_hash').notNull(),
  certification: text('certification'),
  disabledAt: instant('disabled_at'),
  createdAt: instant('created_at').notNull().defaultNow(),
}, t => [
  primaryKey({ name: 'people_pkey', columns: [t.organisationId, t.id] }),
  // One address is one account across organisations: sign-in asks for no organisation. The look-up goes through find_person.
  uniqueIndex('people_email_key').on(t.email),
])

/** A role of a person in one shop. */
export const memberships = pgTable('memberships', {
  organisationId: organisationId(),
  personId: uuid('person_id').notNull(),
  shopId: uuid('shop_id').notNull(),
  role: text('role').$type<Role>().notNull(),
}, t => [
  primaryKey({ name: 'memberships_pkey', columns: [t.organisationId, t.personId, t.shopId, t.role] }),
  foreignKey({ name: 'memberships_person_fkey', columns: [t.organisationId, t.personId], foreignColumns: [people.organisationId, people.id] }),
  foreignKey({ name: 'memberships_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])

/** A signed-in browser. The cookie carries a secret; only its digest is here. */
export const sessions = pgTable('sessions', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  personId: uuid('person_id').notNull(),
  digest: bytea('digest').notNull(),
  userAgent: text('user_agent').notNull().default(''),
  createdAt: instant('created_at').notNull().defaultNow(),
  lastSeenAt: instant('last_seen_at').notNull().defaultNow(),
  expiresAt: instant('expires_at').notNull(),
  revokedAt: instant('revoked_at'),
}, t => [
  primaryKey({ name: 'sessions_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('sessions_digest_key').on(t.digest),
  index('sessions_person_idx').on(t.organisationId, t.personId, t.createdAt),
  foreignKey({ name: 'sessions_person_fkey', columns: [t.organisationId, t.personId], foreignColumns: [people.organisationId, people.id] }),
])
