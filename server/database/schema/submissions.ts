import { sql } from 'drizzle-orm'
import { bigint, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core'
import { bytea, instant, organisationId } from './columns'
import { shops } from './organisations'
import type { SubmissionSource, SubmissionStatus } from '#shared/intake/kinds'

export interface SubmissionFailure { code: string, reason: string, place: string | null }
export interface SubmissionReport { encoding: string | null, delimiter: string | null, extraColumns: string[] }

export const submissions = pgTable('submissions', {
  organisationId: organisationId(),
  id: uuid('id').notNull(),
  shopId: uuid('shop_id').notNull(),
  source: text('source').$type<SubmissionSource>().notNull(),
  /** Whose reading ids these are: `instrument:<id>` for a device, `shop:<id>` for files, `person:<id>` by hand. */
  sender: text('sender').notNull(),
  /** The device's instrument; null where a person sends for several. */
  instrumentId: uuid('instrument_id'),
  personId: uuid('person_id'),
  mediaType: text('media_type').notNull(),
  contentEncoding: text('content_encoding'),
  byteLength: bigint('byte_length', { mode: 'number' }).notNull(),
  sha256: bytea('sha256').notNull(),
  idempotencyKey: text('idempotency_key'),
  status: text('status').$type<SubmissionStatus>().notNull().default('received'),
  receivedAt: instant('received_at').notNull(),
  processedAt: instant('processed_at'),
  /** Raised by every worker that takes the submission up; a commit with an older number is refused (fencing). */
  attempt: integer('attempt').notNull().default(0),
  /** While in the future, a worker is on it; the sweeper takes over after. */
  leaseUntil: instant('lease_until'),
  /** Records below this ordinal are settled; a repeated run goes on from here. */
  nextOrdinal: integer('next_ordinal').notNull().default(1),
  receivedCount: integer('received_count').notNull().default(0),
  acceptedCount: integer('accepted_count').notNull().default(0),
  repeatedCount: integer('repeated_count').notNull().default(0),
  refusedCount: integer('refused_count').notNull().default(0),
  failure: jsonb('failure').$type<SubmissionFailure>(),
  report: jsonb('report').$type<SubmissionReport>(),
  /** What the first request was told, for a repeat with the same key. */
  firstAnswer: jsonb('first_answer').$type<{ status: number, body: unknown }>(),
}, t => [
  primaryKey({ name: 'submissions_pkey', columns: [t.organisationId, t.id] }),
  uniqueIndex('submissions_idempotency_key').on(t.organisationId, t.sender, t.idempotencyKey).where(sql`idempotency_key is not null`),
  index('submissions_received_idx').on(t.organisationId, t.receivedAt, t.id),
  index('submissions_open_idx').on(t.leaseUntil, t.receivedAt).where(sql`status in ('received', 'processing')`),
  foreignKey({ name: 'submissions_shop_fkey', columns: [t.organisationId, t.shopId], foreignColumns: [shops.organisationId, shops.id] }),
])

/** The bytes as they arrived, cut into pieces so that neither side ever holds a whole large file. */
export const submissionChunks = pgTable('submission_chunks', {
  organisationId: organisationId(),
  submissionId: uuid('submission_id').notNull(),
  ordinal: integer('ordinal').notNull(),
  bytes: bytea('bytes').notNull(),
}, t => [
  primaryKey({ name: 'submission_chunks_pkey', columns: [t.organisationId, t.submissionId, t.ordinal] }),
  foreignKey({ name: 'submission_chunks_submission_fkey', columns: [t.organisationId, t.submissionId], foreignColumns: [submissions.organisationId, submissions.id] }),
])

export const refusedRows = pgTable('refused_rows', {
  organisationId: organisationId(),
  submissionId: uuid('submission_id').notNull(),
  ordinal: integer('ordinal').notNull(),
  /** One record can be refused for several reasons. */
  reasonOrdinal: integer('reason_ordinal').notNull(),
  line: integer('line'),
  column: text('column'),
  pointer: text('pointer'),
  value: text('value'),
  code: text('code').notNull(),
  reason: text('reason').notNull(),
  mend: text('mend').notNull(),
  senderReadingId: text('sender_reading_id'),
  conflictingReadingId: uuid('conflicting_reading_id'),
}, t => [
  primaryKey({ name: 'refused_rows_pkey', columns: [t.organisationId, t.submissionId, t.ordinal, t.reasonOrdinal] }),
  foreignKey({ name: 'refused_rows_submission_fkey', columns: [t.organisationId, t.submissionId], foreignColumns: [submissions.organisationId, submissions.id] }),
])
