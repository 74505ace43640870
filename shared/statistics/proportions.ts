import { betaQuantile } from './distributions'
import { requireOpenUnit, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'
import { normalCdf, normalQuantile } from './normal'

function requireCount(x: number, n: number, xName = 'x', nName = 'n'): void {
  requireWhole(n, nName, 0)
  requireWhole(x, xName, 0, n)
}

/**
 * Wilson's interval of a share. 0 of n gives a lower end of exactly 0, n of n an upper end of exactly 1.
 * Count vehicles, not readings: repeats of one vehicle aren't independent and make it too narrow.
 * Source: Wilson 1927; NIST/SEMATECH e-Handbook 7.2.4.1 (both from memory).
 * @param x how many of the n have the property
 * @throws RangeError unless 0 <= x <= n are whole and 0 < confidence < 1.
 */
export function wilsonInterval(x: number, n: number, confidence: number): Interval {
  requireCount(x, n)
  requireOpenUnit(confidence, 'confidence')
  if (n === 0) return noInterval('no values')
  const z = -normalQuantile((1 - confidence) / 2)
  const share = x / n
  const square = z * z / n
  const centre = share + square / 2
  const half = Math.sqrt(square * (share * (1 - share) + square / 4))
  // The lower end as x²/n² over the upper one's numerator keeps its digits near 0; likewise from 1 downwards.
  const lower = x === 0 ? 0 : share * share / (centre + half)
  const upper = x === n ? 1 : 1 - (1 - share) * (1 - share) / (1 - share + square / 2 + half)
  return interval(lower, upper)
}

/**
 * Clopper and Pearson's interval of a share: guaranteed coverage, therefore wider than Wilson's.
 * Source: Clopper and Pearson 1934; NIST/SEMATECH e-Handbook 7.2.4.1 (both from memory).
 * @throws RangeError unless 0 <= x <= n are whole and 0 < confidence < 1.
 */
export function clopperPearsonInterval(x: number, n: number, confidence: number): Interval {
  requireCount(x, n)
  requireOpenUnit(confidence, 'confidence')
  if (n === 0) return noInterval('no values')
  const half = (1 - confidence) / 2
  return interval(
    x === 0 ? 0 : betaQuantile(half, x, n - x + 1),
    x === n ? 1 : 1 - betaQuantile(half, n - x, x + 1),
  )
}

export interface Share {
  x: number
  n: number
}

export interface TwoShares {
  /** Share of the first minus share of the second. */
  difference: number | null
  /** Newcombe's interval of the difference. */
  interval: Interval
  /** Pooled normal test statistic. */
  z: number | null
  /** Two-sided p of the pooled normal test. */
  p: number | null
  /** False when an expected count is below 5: then the p is only a hint (common practice, no source). */
  dependable: boolean
  reason: string | null
}

/**
 * Two shares compared: pooled z test, two-sided, and Newcombe's hybrid score interval of the difference.
 * Source: NIST/SEMATECH e-Handbook 7.3.3; Newcombe 1998, Statistics in Medicine 17, 873, method 10 (both from memory).
 * @throws RangeError unless the counts are whole and fit, and 0 < confidence < 1.
 */
export function compareTwoShares(a: Share, b: Share, confidence: number): TwoShares {
  requireCount(a.x, a.n, 'a.x', 'a.n')
  requireCount(b.x, b.n, 'b.x', 'b.n')
  requireOpenUnit(confidence, 'confidence')
  if (a.n === 0 || b.n === 0) {
    return { difference: null, interval: noInterval('a group is empty'), z: null, p: null, dependable: false, reason: 'a group is empty' }
  }
  const shareA = a.x / a.n
  const shareB = b.x / b.n
  const difference = shareA - shareB
  const wilsonA = wilsonInterval(a.x, a.n, confidence) as { lower: number, upper: number }
  const wilsonB = wilsonInterval(b.x, b.n, confidence) as { lower: number, upper: number }
  const newcombe = interval(
    difference - Math.hypot(shareA - wilsonA.lower, wilsonB.upper - shareB),
    difference + Math.hypot(wilsonA.upper - shareA, shareB - wilsonB.lower),
  )
  const pooled = (a.x + b.x) / (a.n + b.n)
  if (pooled === 0 || pooled === 1) {
    return { difference: 0, interval: newcombe, z: 0, p: 1, dependable: false, reason: pooled === 0 ? 'none in either group' : 'all in both groups' }
  }
  const z = difference / Math.sqrt(pooled * (1 - pooled) * (1 / a.n + 1 / b.n))
  const dependable = Math.min(a.n, b.n) * Math.min(pooled, 1 - pooled) >= 5
  return {
    difference,
    interval: newcombe,
    z,
    p: Math.min(1, 2 * normalCdf(-Math.abs(z))),
    dependable,
    reason: dependable ? null : 'an expected count is below 5',
  }
}
