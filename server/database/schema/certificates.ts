import { foreignKey, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'
import { shops } from './organisations'
import type { CertificateStatement } from '#shared/certificates/statement'

/** The last number given out in each shop; its row is locked while a certificate is issued, so that a number is never skipped. */
export const certificateCounters = pgTable('certificate_counters', {
  organisationId: organisationId(),
  shopId: uuid('shop_id').notNull(),
  lastNumber: integer('last_number').notNull().default(0),
}, t => [
  primaryKey({ name: 'certificate_counters_pkey', columns: [t.organisationId, t.shopId] }),
  foreignKey({ name: 'certificate_counters_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])

/** A signed statement on one revision of a reading. Only its withdrawal is ever added. */
export const certificates = pgTable('certificates', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  shopId: uuid('shop_id').notNull(),
  number: integer('number').notNull(),
  readingId: uuid('reading_id').notNull(),
  readingRevision: integer('reading_revision').notNull(),
  /** Opens the public page; 80 random bits. */
  code: text('code').notNull(),
  issuedAt: instant('issued_at').notNull(),
  /** `person:<id>` or `device:<token id>`. */
  issuedBy: text('issued_by').notNull(),
  content: jsonb('content').$type<CertificateStatement>().notNull(),
  /** Ed25519 over the canonical JSON (RFC 8785) of `content`. */
  signature: bytea('signature').notNull(),
  keyId: text('key_id').notNull(),
  withdrawnAt: instant('withdrawn_at'),
  withdrawnBy: uuid('withdrawn_by'),
  withdrawalReason: text('withdrawal_reason'),
}, t => [
  primaryKey({ name: 'certificates_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('certificates_number_key').on(t.organisationId, t.shopId, t.number),
  uniqueIndex('certificates_reading_key').on(t.organisationId, t.readingId, t.readingRevision),
  // A stranger brings the code alone; the look-up goes through find_certificate.
  uniqueIndex('certificates_code_key').on(t.code),
  foreignKey({ name: 'certificates_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])
