import { withdrawBody } from '#shared/api/certificates'
import { certificateExists, withdrawCertificate } from '../../../services/certificates/withdraw-certificate'

/** Withdraws a certificate for good, with the reason. */
export default apiHandler(async (event) => {
  const member = await requireMember(event, 'certificates.withdraw')
  const id = idFromPath(event)
  if (!await certificateExists(member, id)) throw notFound()
  const { reason } = await readJsonBody(event, withdrawBody)
  if (!await withdrawCertificate(member, { id, personId: member.personId, reason, now: new Date() })) throw new Problem(422, 'certificate-withdrawn', 'This certificate was withdrawn before.')
  return { withdrawn: true }
})
