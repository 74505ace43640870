import { publishedKeys } from '../../services/certificates/signing'

/** Public keys of the certificates' signatures, as a JSON Web Key Set (RFC 7517, RFC 8037). */
export default defineEventHandler((event) => {
  setResponseHeaders(event, { 'content-type': 'application/json; charset=utf-8', 'cache-control': 'public, max-age=300', 'access-control-allow-origin': '*', 'cross-origin-resource-policy': 'cross-origin' })
  return { keys: publishedKeys() }
})
