import { findPublicCertificate } from '../../services/certificates/find-public-certificate'

/** Whether a certificate is genuine, for anybody who holds it. */
export default apiHandler(async (event) => {
  const found = await findPublicCertificate(getRouterParam(event, 'code') ?? '')
  if (!found) throw new Problem(404, 'not-found', 'There is no certificate with this code.')
  return found
})
