const WINDOW_MINUTES = 15
/** Wrong passwords from one address in a window, and for one account from one address. Nobody can lock out somebody else: the account alone is never counted. */
const PER_ADDRESS = 60
const PER_ACCOUNT_AND_ADDRESS = 10
const MOST_KEYS = 50_000

interface Attempt { account: string, address: string }

/** Counts wrong passwords in memory; a restart forgives, and each web process counts for itself. */
export class SignInThrottle {
  private failures = new Map<string, { since: number, count: number }>()

  private keys({ account, address }: Attempt): [string, number][] {
    return [[`address ${address}`, PER_ADDRESS], [`both ${account} ${address}`, PER_ACCOUNT_AND_ADDRESS]]
  }

  /** Seconds to wait; 0 where another try is free. */
  refuses(attempt: Attempt & { now: Date }): number {
    let wait = 0
    for (const [key, limit] of this.keys(attempt)) {
      const entry = this.failures.get(key)
      if (!entry || entry.count < limit) continue
      wait = Math.max(wait, Math.ceil((entry.since + WINDOW_MINUTES * 60_000 - attempt.now.getTime()) / 1000))
    }
    return wait
  }

  failed(attempt: Attempt & { now: Date }): void {
    const now = attempt.now.getTime()
    for (const [key] of this.keys(attempt)) {
      const entry = this.failures.get(key)
      if (entry && now - entry.since < WINDOW_MINUTES * 60_000) entry.count++
      else {
        this.failures.delete(key)
        this.failures.set(key, { since: now, count: 1 })
      }
    }
    // Oldest first out: an attacker with many names must not grow the process.
    for (const key of this.failures.keys()) {
      if (this.failures.size <= MOST_KEYS) break
      this.failures.delete(key)
    }
  }

  succeeded({ account, address }: Attempt): void {
    this.failures.delete(`both ${account} ${address}`)
  }
}
