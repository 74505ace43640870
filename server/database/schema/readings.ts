import { sql } from 'drizzle-orm'
import { bigint, doublePrecision, index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'
import type { NormalisedComposition, ReportedComposition } from '#shared/composition/types'
import type { Flag, SubjectKind, SubmissionSource } from '#shared/intake/kinds'
import type { Designation, Substance } from '#shared/refrigerants/designations'
import type { RuleName, Verdict, VerdictKind } from '#shared/verdict/types'

/**
 * One row a reading: its current revision. Partitioned by month of `sampled_at` (the migration says so;
 * the ORM can't). The id is a UUIDv7 made from `sampled_at`, so that an id alone leads to its partition,
 * and the primary key serves the newest-first list.
 */
export const readings = pgTable('readings', {
  organisationId: organisationId(),
  sampledAt: instant('sampled_at').notNull(),
  id: uuid('id').notNull(),
  shopId: uuid('shop_id').notNull(),
  instrumentId: uuid('instrument_id'),
  sequence: bigint('sequence', { mode: 'number' }),
  subjectKind: text('subject_kind').$type<SubjectKind>().notNull(),
  subjectId: uuid('subject_id').notNull(),
  workOrderId: uuid('work_order_id'),
  declared: text('declared').$type<Designation>().notNull(),
  verdict: text('verdict').$type<VerdictKind>().notNull(),
  decidedBy: text('decided_by').$type<RuleName>().notNull(),
  decidedBySubstance: text('decided_by_substance').$type<Substance>(),
  purityPercent: doublePrecision('purity_percent').notNull(),
  purityUncertainty: doublePrecision('purity_uncertainty'),
  airPercent: doublePrecision('air_percent'),
  /** Parts other than the declared one, largest first, for lists. */
  contaminants: jsonb('contaminants').$type<{ substance: Substance, percent: number }[]>().notNull(),
  resolution: doublePrecision('resolution').notNull(),
  reported: jsonb('reported').$type<ReportedComposition>().notNull(),
  composition: jsonb('composition').$type<NormalisedComposition>().notNull(),
  verdictDetail: jsonb('verdict_detail').$type<Verdict>().notNull(),
  limitSetVersion: integer('limit_set_version').notNull(),
  attempt: integer('attempt').notNull(),
  flags: text('flags').array().$type<Flag[]>().notNull(),
  batch: text('batch'),
  operator: text('operator'),
  note: text('note').notNull().default(''),
  ambientCelsius: doublePrecision('ambient_celsius'),
  pressureKilopascal: doublePrecision('pressure_kilopascal'),
  pressureKind: text('pressure_kind').$type<'gauge' | 'absolute'>(),
  port: text('port').$type<'low' | 'high'>(),
  extras: jsonb('extras').$type<Record<string, string>>(),
  source: text('source').$type<SubmissionSource>().notNull(),
  submissionId: uuid('submission_id').notNull(),
  ordinal: integer('ordinal').notNull(),
  line: integer('line'),
  sender: text('sender').notNull(),
  senderReadingId: text('sender_reading_id').notNull(),
  receivedAt: instant('received_at').notNull(),
  revision: integer('revision').notNull().default(1),
  revisedAt: instant('revised_at'),
  revisedBy: uuid('revised_by'),
  revisionReason: text('revision_reason'),
  /** SHA-256 of the record in canonical form (RFC 8785), and the audit event that carries it. */
  recordDigest: bytea('record_digest').notNull(),
  auditSequence: bigint('audit_sequence', { mode: 'number' }).notNull(),
}, t => [
  primaryKey({ name: 'readings_pkey', columns: [t.organisationId, t.sampledAt, t.id] }),
  index('readings_subject_idx').on(t.organisationId, t.subjectId, t.sampledAt, t.id),
  index('readings_shop_idx').on(t.organisationId, t.shopId, t.sampledAt, t.id),
  index('readings_instrument_idx').on(t.organisationId, t.instrumentId, t.sampledAt, t.id),
  index('readings_declared_idx').on(t.organisationId, t.declared, t.sampledAt, t.id),
  index('readings_verdict_idx').on(t.organisationId, t.verdict, t.shopId, t.sampledAt, t.id).where(sql`verdict <> 'connect'`),
  index('readings_batch_idx').on(t.organisationId, t.batch, t.sampledAt, t.id).where(sql`batch is not null`),
])

/**
 * What makes a sender's id unique for ever: a unique key on `readings` would have to contain the
 * partition key, so the same id with another time would pass. Written in the same transaction.
 */
export const readingIdentities = pgTable('reading_identities', {
  organisationId: organisationId(),
  sender: text('sender').notNull(),
  senderReadingId: text('sender_reading_id').notNull(),
  readingId: uuid('reading_id').notNull(),
  sampledAt: instant('sampled_at').notNull(),
  submissionId: uuid('submission_id').notNull(),
  /** SHA-256 of what the sender sent, in canonical form: tells a repeat from a conflict. */
  contentDigest: bytea('content_digest').notNull(),
}, t => [
  primaryKey({ name: 'reading_identities_pkey', columns: [t.organisationId, t.sender, t.senderReadingId] }),
  index('reading_identities_submission_idx').on(t.organisationId, t.submissionId),
])

/** Superseded revisions, as they stood. The current one is the row in `readings`. */
export const readingRevisions = pgTable('reading_revisions', {
  organisationId: organisationId(),
  readingId: uuid('reading_id').notNull(),
  revision: integer('revision').notNull(),
  at: instant('at').notNull(),
  personId: uuid('person_id'),
  reason: text('reason'),
  verdict: text('verdict').$type<VerdictKind>().notNull(),
  limitSetVersion: integer('limit_set_version').notNull(),
  /** The whole row as it was. */
  snapshot: jsonb('snapshot').notNull(),
}, t => [primaryKey({ name: 'reading_revisions_pkey', columns: [t.organisationId, t.readingId, t.revision] })])

/** Counts and sums by day, kept in the transaction that writes the readings; a command rebuilds and compares them. */
export const readingRollups = pgTable('reading_rollups', {
  organisationId: organisationId(),
  shopId: uuid('shop_id').notNull(),
  /** Day in the shop's zone. */
  day: text('day').notNull(),
  declared: text('declared').$type<Designation>().notNull(),
  subjectKind: text('subject_kind').$type<SubjectKind>().notNull(),
  /** The nil UUID stands for "no instrument", because a key can't hold null. */
  instrumentId: uuid('instrument_id').notNull(),
  verdict: text('verdict').$type<VerdictKind>().notNull(),
  n: integer('n').notNull(),
  puritySum: doublePrecision('purity_sum').notNull(),
  puritySquareSum: doublePrecision('purity_square_sum').notNull(),
  airN: integer('air_n').notNull(),
  airSum: doublePrecision('air_sum').notNull(),
  airSquareSum: doublePrecision('air_square_sum').notNull(),
}, t => [primaryKey({ name: 'reading_rollups_pkey', columns: [t.organisationId, t.shopId, t.day, t.declared, t.subjectKind, t.instrumentId, t.verdict] })])
