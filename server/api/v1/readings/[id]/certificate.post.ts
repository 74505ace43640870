import { CertificateWithdrawn } from '../../../../services/certificates/certificates.errors'
import { issueCertificate } from '../../../../services/certificates/issue-certificate'
import { SigningUnavailable } from '../../../../services/certificates/signing'

/** Issues the certificate of the reading as it stands, or answers the one there is. */
export default apiHandler(async (event) => {
  const { scope, issuer } = await requireIssuer(event)
  try {
    const issued = await issueCertificate(scope, idFromPath(event), issuer, new Date())
    if (!issued) throw notFound()
    if (issued.isNew) setResponseStatus(event, 201)
    return issued.row
  } catch (error) {
    if (error instanceof SigningUnavailable) throw new Problem(503, 'signing-key', 'This installation has no signing key, so it issues no certificates. Whoever runs it sets COLDSLIP_SIGNING_KEY.')
    if (error instanceof CertificateWithdrawn) throw new Problem(422, 'certificate-withdrawn', 'The certificate of this revision was withdrawn. Correct the reading or have it judged anew, then issue another.')
    throw error
  }
})
