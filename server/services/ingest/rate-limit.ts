/** More tokens than this are not counted apart; the longest unused goes first. */
const MOST_KEYS = 20_000

/**
 * A bucket for each sender: it holds `burst` requests and refills with `perSecond`. In memory, each web
 * process for itself: a bound against a device gone mad, not an account.
 */
export class RateLimit {
  private buckets = new Map<string, { left: number, at: number }>()

  constructor(private perSecond: number, private burst: number) {}

  /** Takes one request. @returns 0 where it may go on, else the seconds to wait. */
  take(key: string, nowMilliseconds: number): number {
    const bucket = this.buckets.get(key) ?? { left: this.burst, at: nowMilliseconds }
    const left = Math.min(this.burst, bucket.left + (nowMilliseconds - bucket.at) / 1000 * this.perSecond)
    this.buckets.delete(key)
    this.buckets.set(key, { left: left >= 1 ? left - 1 : left, at: nowMilliseconds })
    if (this.buckets.size > MOST_KEYS) this.buckets.delete(this.buckets.keys().next().value!)
    return left >= 1 ? 0 : Math.ceil((1 - left) / this.perSecond)
  }
}
