import { bigint, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'

/** Append-only, hash-chained per organisation: each digest covers the one before it. */
export const auditEvents = pgTable('audit_events', {
  organisationId: organisationId(),
  sequence: bigint('sequence', { mode: 'number' }).notNull(),
  at: instant('at').notNull(),
  /** `person:<id>`, `device:<token id>` or `system`. */
  actor: text('actor').notNull(),
  action: text('action').notNull(),
  entityKind: text('entity_kind').notNull(),
  entityId: text('entity_id').notNull(),
  detail: jsonb('detail').$type<Record<string, unknown>>().notNull(),
  previousDigest: bytea('previous_digest').notNull(),
  digest: bytea('digest').notNull(),
}, t => [primaryKey({ name: 'audit_events_pkey', columns: [t.organisationId, t.sequence] })])

/** The end of each chain; locked while an event is appended. */
export const auditHeads = pgTable('audit_heads', {
  organisationId: uuid('organisation_id').primaryKey(),
  sequence: bigint('sequence', { mode: 'number' }).notNull(),
  digest: bytea('digest').notNull(),
})
