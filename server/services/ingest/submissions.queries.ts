import type { SubmissionSource } from '#shared/intake/kinds'
import type { SubmissionFailure, SubmissionReport } from '../../database/schema/submissions'
import { withOrganisationBulk, type BulkTransaction } from '../../database/tenancy'
import { NEWS_CHANNEL } from '../../database/queue/definitions'
import { appendAuditEvent } from '../audit/append-event'

/** A worker that shows no progress for this long is taken for dead. */
export const LEASE_SECONDS = 30

export interface OpenSubmission {
  organisationId: string
  id: string
  shopId: string
  timeZone: string
  source: SubmissionSource
  sender: string
  /** The serial that a device's token speaks for; null where a person sends for several instruments. */
  instrumentSerial: string | null
  mediaType: string
  contentEncoding: string | null
  byteLength: number
  receivedAt: Date
  sha256: Uint8Array
  actor: string
  attempt: number
  nextOrdinal: number
}

/** Marks the submission as being worked on under a new attempt number; null where it is settled already. */
export async function takeUp(tx: BulkTransaction, organisationId: string, submissionId: string): Promise<OpenSubmission | null> {
  const [row] = await tx<(Omit<OpenSubmission, 'organisationId' | 'actor'> & { personId: string | null, instrumentId: string | null })[]>`
    update submissions s set status = 'processing', attempt = s.attempt + 1, lease_until = now() + make_interval(secs => ${LEASE_SECONDS})
    from shops h
    where s.organisation_id = ${organisationId} and s.id = ${submissionId} and s.status in ('received', 'processing')
      and h.organisation_id = s.organisation_id and h.id = s.shop_id
    returning s.id, s.shop_id as "shopId", h.time_zone as "timeZone", s.source, s.sender, s.media_type as "mediaType",
      s.content_encoding as "contentEncoding", s.byte_length::float8 as "byteLength", s.received_at as "receivedAt", s.sha256, s.attempt, s.next_ordinal as "nextOrdinal",
      s.person_id as "personId", s.instrument_id as "instrumentId",
      (select i.serial from instruments i where i.organisation_id = s.organisation_id and i.id = s.instrument_id) as "instrumentSerial"`
  if (!row) return null
  const actor = row.personId ? `person:${row.personId}` : row.instrumentId ? `instrument:${row.instrumentId}` : 'system'
  return { ...row, organisationId, actor }
}

/** The bytes as they came, piece by piece; each piece in a transaction of its own, so that none stays open while the work goes on. */
export async function* chunksOf({ organisationId, id }: { organisationId: string, id: string }): AsyncGenerator<Uint8Array> {
  for (let ordinal = 0; ; ordinal++) {
    const [row] = await withOrganisationBulk(organisationId, tx => tx<{ bytes: Uint8Array }[]>`
      select bytes from submission_chunks where organisation_id = ${organisationId} and submission_id = ${id} and ordinal = ${ordinal}`)
    if (!row) return
    yield row.bytes
  }
}

/** Settles a submission that can't be read as a whole; what was accepted before the fault stays. */
export async function failSubmission(submission: OpenSubmission, failure: SubmissionFailure, report: SubmissionReport): Promise<void> {
  const { organisationId, id, attempt } = submission
  await withOrganisationBulk(organisationId, async (tx) => {
    const changed = await tx`
      update submissions set status = 'failed', processed_at = now(), lease_until = null,
        failure = ${tx.json(failure as never)}, report = ${tx.json(report as never)}
      where organisation_id = ${organisationId} and id = ${id} and attempt = ${attempt} and status = 'processing' returning id`
    if (changed.length === 0) return
    await appendAuditEvent(tx, {
      organisationId, at: new Date(), actor: submission.actor, action: 'submission.failed', entityKind: 'submission', entityId: id,
      detail: { sha256: Buffer.from(submission.sha256).toString('hex'), code: failure.code, reason: failure.reason, place: failure.place },
    })
    await tx`select pg_notify(${NEWS_CHANNEL}, ${JSON.stringify({ organisationId, submissionId: id, readingIds: [], count: 0, settled: true })})`
  })
}
