import { createHash, createPublicKey, sign, type KeyObject } from 'node:crypto'
import canonicalize from 'canonicalize'
import type { CertificateStatement } from '#shared/certificates/statement'
import { settings } from '../../settings'

/** There is no key in this installation, so nothing can be signed. */
export class SigningUnavailable extends Error {}

/** A public key as RFC 8037 writes it; `kid` is the first 16 hexadecimal digits of the SHA-256 of its 32 bytes. */
export interface PublishedKey { kty: 'OKP', crv: 'Ed25519', use: 'sig', alg: 'EdDSA', kid: string, x: string }

function publishedKey(key: KeyObject): PublishedKey {
  const { x } = createPublicKey({ key: key.type === 'private' ? key.export({ format: 'pem', type: 'pkcs8' }) : key.export({ format: 'pem', type: 'spki' }) }).export({ format: 'jwk' })
  const kid = createHash('sha256').update(Buffer.from(x!, 'base64url')).digest('hex').slice(0, 16)
  return { kty: 'OKP', crv: 'Ed25519', use: 'sig', alg: 'EdDSA', kid, x: x! }
}

/** All keys that certificates of this installation were signed with, the present one first. */
export function publishedKeys(): PublishedKey[] {
  const { signingKey, oldPublicKeys } = settings()
  return [...(signingKey ? [signingKey] : []), ...oldPublicKeys].map(publishedKey)
}

/** The bytes that are signed: canonical JSON (RFC 8785), UTF-8. */
export function signedBytes(statement: CertificateStatement): Buffer {
  return Buffer.from(canonicalize(statement)!, 'utf8')
}

/**
 * Ed25519 (RFC 8032) over the canonical statement.
 *
 * @throws SigningUnavailable where the installation has no key.
 */
export function signStatement(statement: CertificateStatement): { signature: Buffer, keyId: string } {
  const { signingKey } = settings()
  if (!signingKey) throw new SigningUnavailable('no signing key')
  return { signature: sign(null, signedBytes(statement), signingKey), keyId: publishedKey(signingKey).kid }
}
