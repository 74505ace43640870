import { describe, expect, it } from 'vitest'
import { RateLimit } from '#server/services/ingest/rate-limit'

describe('the rate limit of a token', () => {
  it('lets a burst through, then the steady rate, and says how long to wait', () => {
    const limit = new RateLimit(2, 5)
    expect(Array.from({ length: 7 }, () => limit.take('a', 0))).toEqual([0, 0, 0, 0, 0, 1, 1])
    expect(limit.take('a', 500)).toBe(0)
    expect(limit.take('a', 500)).toBe(1)
    expect(Array.from({ length: 6 }, () => limit.take('a', 60_000))).toEqual([0, 0, 0, 0, 0, 1])
  })

  it('counts each token for itself', () => {
    const limit = new RateLimit(1, 1)
    expect([limit.take('a', 0), limit.take('b', 0), limit.take('a', 0), limit.take('b', 0)]).toEqual([0, 0, 1, 1])
  })
})
