import { chiSquareQuantile, tQuantile, tTwoSided } from './distributions'
import { requireFinite, requireNotNegative, requireOpenUnit, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'

/** n, mean and sample standard deviation of a batch, in one unit. */
export interface MeanAndSpread {
  n: number
  mean: number
  /** null below two values. */
  standardDeviation: number | null
}

/** @throws RangeError when the figures can't belong to a batch. */
export function requireMeanAndSpread(sample: MeanAndSpread): void {
  requireWhole(sample.n, 'n', 1)
  requireFinite(sample.mean, 'mean')
  if (sample.standardDeviation !== null) requireNotNegative(sample.standardDeviation, 'standardDeviation')
}

/**
 * Interval of the mean, m ± t s/√n. It says nothing about single results.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.2, 7.2.2.1 (from memory).
 * @param confidence between 0 and 1, for example 0.95
 * @throws RangeError on a wrong argument.
 */
export function meanInterval(sample: MeanAndSpread, confidence: number): Interval {
  requireMeanAndSpread(sample)
  requireOpenUnit(confidence, 'confidence')
  const { n, mean, standardDeviation: s } = sample
  if (n < 2 || s === null) return noInterval('an interval of the mean needs at least two values')
  const half = tQuantile(1 - (1 - confidence) / 2, n - 1) * s / Math.sqrt(n)
  return interval(mean - half, mean + half)
}

/**
 * Interval of the standard deviation, s √(ν/χ²). It depends strongly on the values being normally distributed.
 * Source: NIST/SEMATECH e-Handbook 7.2.3.1 (from memory).
 * @throws RangeError on a wrong argument.
 */
export function standardDeviationInterval(sample: Omit<MeanAndSpread, 'mean'>, confidence: number): Interval {
  requireMeanAndSpread({ ...sample, mean: 0 })
  requireOpenUnit(confidence, 'confidence')
  const { n, standardDeviation: s } = sample
  if (n < 2 || s === null) return noInterval('an interval of the standard deviation needs at least two values')
  if (s === 0) return noInterval('all values are equal: the spread is hidden by the resolution')
  const alpha = 1 - confidence
  const df = n - 1
  return interval(s * Math.sqrt(df / chiSquareQuantile(1 - alpha / 2, df)), s * Math.sqrt(df / chiSquareQuantile(alpha / 2, df)))
}

export interface OneSampleT {
  t: number | null
  df: number | null
  /** Two-sided. */
  p: number | null
  reason: string | null
}

/**
 * t test of a mean against a given value, (m - mu) √n / s, two-sided.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.2 (from memory).
 * @throws RangeError on a wrong argument.
 */
export function oneSampleT(sample: MeanAndSpread, against: number): OneSampleT {
  requireMeanAndSpread(sample)
  requireFinite(against, 'against')
  const { n, mean, standardDeviation: s } = sample
  if (n < 2 || s === null) return { t: null, df: null, p: null, reason: 'a test of the mean needs at least two values' }
  if (s === 0) return { t: null, df: n - 1, p: null, reason: 'all values are equal: the spread is hidden by the resolution' }
  const t = (mean - against) * Math.sqrt(n) / s
  return { t, df: n - 1, p: tTwoSided(t, n - 1), reason: null }
}
