import type { SignedCertificate } from '#shared/api/certificates'

/** The certificate for programs: the statement with its signature. */
export default apiHandler(async (event): Promise<SignedCertificate> => {
  const { row, statement, signature, keyId } = await readCertificate(event)
  setResponseHeader(event, 'content-disposition', `inline; filename="certificate-${row.number}.json"`)
  return { statement, signature: { algorithm: 'Ed25519', canonicalisation: 'RFC 8785', keyId, value: Buffer.from(signature).toString('base64url') } }
})
