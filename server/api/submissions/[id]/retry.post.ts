import { retrySubmission } from '../../../services/ingest/abandon-submission'

/** Sends a submission through again that a fault of ours had stopped. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'readings.correct')
  if (!await retrySubmission({ organisationId: member.organisationId, submissionId: idFromPath(event), actor: `person:${member.personId}` })) throw notFound()
  return { queued: true }
})
