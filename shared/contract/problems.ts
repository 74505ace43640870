/**
 * Codes of the problems (RFC 9457) that the calls answer with: the last part of a problem's `type`, and
 * the place on the documentation page where it is explained.
 */
export const PROBLEMS = [
  { code: 'syntax', status: 400, meaning: 'The body is not JSON. The place is told.' },
  { code: 'encoding', status: 400, meaning: 'The body is not text in the expected encoding.' },
  { code: 'empty', status: 400, meaning: 'There is no reading in the body.' },
  { code: 'type', status: 400, meaning: '"readings" is not a list.' },
  { code: 'unknown-member', status: 400, meaning: 'The body has a member beside "readings".' },
  { code: 'duplicate-member', status: 400, meaning: 'The body has "readings" twice.' },
  { code: 'gzip', status: 400, meaning: 'The body says that it is gzip, and is not, or not all of it.' },
  { code: 'cut', status: 400, meaning: 'The body ended before its announced length.' },
  { code: 'idempotency-key', status: 400, meaning: 'The Idempotency-Key is empty or too long.' },
  { code: 'cursor', status: 400, meaning: 'The cursor does not belong to these filters.' },
  { code: 'invalid', status: 400, meaning: 'A parameter of the query is not known or out of range.' },
  { code: 'token', status: 401, meaning: 'The token is missing, malformed, unknown, revoked or expired.' },
  { code: 'scope', status: 403, meaning: 'The token may not do this.' },
  { code: 'not-found', status: 404, meaning: 'There is nothing here that you may see.' },
  { code: 'method', status: 405, meaning: 'The address does not know this method.' },
  { code: 'under-way', status: 409, meaning: 'The first request with this key is still being stored. Send it again in a moment.' },
  { code: 'too-large', status: 413, meaning: 'The body is over its limit.' },
  { code: 'inflated-too-large', status: 413, meaning: 'The body is over its limit once inflated.' },
  { code: 'too-many-readings', status: 413, meaning: 'A JSON body holds too many readings.' },
  { code: 'media-type', status: 415, meaning: 'The media type is missing or not one that is read.' },
  { code: 'content-encoding', status: 415, meaning: 'The content encoding is not understood.' },
  { code: 'key-reused', status: 422, meaning: 'The Idempotency-Key came before with other bytes.' },
  { code: 'throttled', status: 429, meaning: 'Too many requests. Wait as long as Retry-After says.' },
  { code: 'fault', status: 500, meaning: 'A fault of the server. Nothing was taken.' },
  { code: 'busy', status: 503, meaning: 'The server has too much to do. Nothing was taken; wait as long as Retry-After says.' },
  { code: 'unavailable', status: 503, meaning: 'The database does not answer. Nothing was taken; wait as long as Retry-After says.' },
] as const
