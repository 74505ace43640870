import { withOrganisationBulk } from '../../database/tenancy'
import { enqueueIntake } from '../../database/queue/boss'
import { NEWS_CHANNEL } from '../../database/queue/definitions'
import { appendAuditEvent } from '../audit/append-event'

const failure = { code: 'fault', reason: 'The submission could not be processed after several tries. Its bytes are kept; it can be sent through again.', place: null }

/** Settles a submission whose job failed to the last retry. */
export async function abandonSubmission({ organisationId, submissionId }: { organisationId: string, submissionId: string }): Promise<void> {
  await withOrganisationBulk(organisationId, async (tx) => {
    const changed = await tx`
      update submissions set status = 'failed', processed_at = now(), lease_until = null, attempt = attempt + 1, failure = ${tx.json(failure)}
      where organisation_id = ${organisationId} and id = ${submissionId} and status in ('received', 'processing') returning id`
    if (changed.length === 0) return
    await appendAuditEvent(tx, { organisationId, at: new Date(), actor: 'system', action: 'submission.abandoned', entityKind: 'submission', entityId: submissionId, detail: failure })
    await tx`select pg_notify(${NEWS_CHANNEL}, ${JSON.stringify({ organisationId, submissionId, readingIds: [], count: 0, settled: true })})`
  })
}

/** Queues a submission again that a fault had stopped. @returns false where it is not one. */
export async function retrySubmission({ organisationId, submissionId, actor }: { organisationId: string, submissionId: string, actor: string }): Promise<boolean> {
  return withOrganisationBulk(organisationId, async (tx) => {
    const changed = await tx`
      update submissions set status = 'received', processed_at = null, failure = null, lease_until = null
      where organisation_id = ${organisationId} and id = ${submissionId} and status = 'failed' and failure->>'code' = 'fault' returning id`
    if (changed.length === 0) return false
    await Promise.all(enqueueIntake(tx, [{ organisationId, submissionId }], 'again'))
    await appendAuditEvent(tx, { organisationId, at: new Date(), actor, action: 'submission.retried', entityKind: 'submission', entityId: submissionId, detail: {} })
    return true
  })
}
