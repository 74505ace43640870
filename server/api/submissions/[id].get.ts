import { getSubmission } from '../../services/ingest/list-submissions'

/** One submission with its refused rows. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'intake.see')
  const submission = await getSubmission(member, idFromPath(event), { sender: null })
  if (!submission) throw notFound()
  return submission
})
