import { RateLimit } from '../services/ingest/rate-limit'
import { settings } from '../settings'
import { Problem } from './problem'

let limit: RateLimit | null = null

/** @throws Problem 429 with `Retry-After` where the token sends more than its rate; nothing was read of the body. */
export function requireIntakeRate(tokenId: string): void {
  const { intakePerMinute } = settings()
  limit ??= new RateLimit(intakePerMinute / 60, Math.max(1, intakePerMinute / 3))
  const wait = limit.take(tokenId, Date.now())
  if (wait > 0) throw new Problem(429, 'throttled', `This token may send ${intakePerMinute} requests a minute. Put several readings into one request, or wait.`, { headers: { 'retry-after': String(wait) } })
}
