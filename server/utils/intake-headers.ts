import type { H3Event } from 'h3'
import { Problem } from './problem'

/** `Idempotency-Key`, bare or as a quoted string: both spell the same key. Null where none was sent. */
export function readIdempotencyKey(event: H3Event): string | null {
  const given = getHeader(event, 'idempotency-key')
  if (given === undefined) return null
  const key = given.trim().replace(/^"(.*)"$/, '$1')
  if (key.length === 0 || key.length > 255 || !/^[\x20-\x7E]+$/.test(key)) throw new Problem(400, 'idempotency-key', 'Idempotency-Key must have 1 to 255 printable ASCII characters.')
  return key
}

/** Seconds of `Prefer: wait=N` (RFC 7240), 1 to 10; 0 where the sender does not want to wait. */
export function readPreferWait(event: H3Event): number {
  const found = /(?:^|[,;\s])wait\s*=\s*"?(\d{1,6})"?/i.exec(getHeader(event, 'prefer') ?? '')
  return found ? Math.min(10, Math.max(1, Number(found[1]))) : 0
}
