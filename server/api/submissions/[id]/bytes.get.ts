import { getSubmission } from '../../../services/ingest/list-submissions'
import { chunksOf } from '../../../services/ingest/submissions.queries'

/** The bytes exactly as they came, as a download that no browser will render. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'intake.see')
  const id = idFromPath(event)
  const submission = await getSubmission(member, id, { sender: null })
  if (!submission) throw notFound()
  const ending = submission.mediaType === 'text/csv' ? 'csv' : submission.mediaType === 'application/json' ? 'json' : 'ndjson'
  setResponseHeaders(event, {
    'content-type': 'application/octet-stream',
    'content-disposition': `attachment; filename="submission-${id}.${ending}"`,
    'content-length': submission.byteLength,
    'content-security-policy': 'sandbox',
    'x-content-type-options': 'nosniff',
    'digest': `sha-256=${Buffer.from(submission.sha256, 'hex').toString('base64')}`,
  })
  const { Readable } = await import('node:stream')
  return sendStream(event, Readable.from(chunksOf({ organisationId: member.organisationId, id })))
})
