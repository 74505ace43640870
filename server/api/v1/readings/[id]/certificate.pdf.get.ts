import { certificateQuery } from '#shared/api/certificates'
import { drawCertificate } from '../../../../services/certificates/pdf/draw-certificate'

/** The certificate on paper. */
export default apiHandler(async (event) => {
  const certificate = await readCertificate(event)
  const { format } = readQuery(event, certificateQuery)
  const pdf = await drawCertificate(certificate, { format, verifyAddress: verifyAddress(event, certificate.row.code) })
  setResponseHeaders(event, {
    'content-type': 'application/pdf',
    'content-disposition': `inline; filename="certificate-${certificate.row.number}.pdf"`,
    'content-security-policy': 'sandbox',
  })
  return pdf
})
