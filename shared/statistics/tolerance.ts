import { chiSquareQuantile, chiSquareUpper } from './distributions'
import { requireAllFinite, requireOpenUnit, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'
import { type MeanAndSpread, requireMeanAndSpread } from './intervals'
import { noncentralTQuantile } from './noncentral-t'
import { normalCdf, normalDensity, normalQuantile } from './normal'
import { panelRule } from './quadrature'
import { findRoot } from './roots'

function requireToleranceArguments(n: number, coverage: number, confidence: number): void {
  requireWhole(n, 'n', 2)
  requireOpenUnit(coverage, 'coverage')
  requireOpenUnit(confidence, 'confidence')
}

/**
 * Approximate two-sided tolerance factor by Howe, z √(ν (1 + 1/n) / χ²). Off by some tenths of a percent for small n;
 * to be called "approximate" wherever it is shown.
 * Source: NIST/SEMATECH e-Handbook 7.2.6.3; Howe 1969, J. Amer. Statist. Assoc. 64, 610.
 * @param n number of values, at least 2
 * @param coverage share of the population that the interval holds
 * @param confidence with which it does
 */
export function howeFactor(n: number, coverage: number, confidence: number): number {
  requireToleranceArguments(n, coverage, confidence)
  const df = n - 1
  return normalQuantile((1 + coverage) / 2) * Math.sqrt(df * (1 + 1 / n) / chiSquareQuantile(1 - confidence, df))
}

/**
 * Exact two-sided tolerance factor: k with ∫ φ_{1/√n}(a) P(χ²_ν > ν r(a)²/k²) da = confidence, where Φ(a + r) - Φ(a - r) = coverage.
 * Source: Odeh and Owen 1980; ISO 16269-6:2014 (from memory).
 */
export function exactTwoSidedFactor(n: number, coverage: number, confidence: number): number {
  requireToleranceArguments(n, coverage, confidence)
  const df = n - 1
  const root = Math.sqrt(n)
  // In a √n the weight is the standard normal density; symmetric, so half the line counts twice.
  const rule = panelRule([0, 9.5], 8)
  const nodes = rule.points.map((u, i) => {
    const a = u / root
    const weight = 2 * rule.weights[i]! * normalDensity(u)
    const half = findRoot(r => 1 - coverage - normalCdf(-a - r) - normalCdf(a - r), 0, a + normalQuantile((1 + coverage) / 2) + 1)
    return { weight, square: half * half }
  })
  const gap = (logFactor: number): number => {
    const factor = Math.exp(2 * logFactor)
    let sum = 0
    for (const node of nodes) sum += node.weight * chiSquareUpper(df * node.square / factor, df)
    return sum - confidence
  }
  const start = Math.log(howeFactor(n, coverage, confidence))
  return Math.exp(findRoot(gap, start - 1, start + 1))
}

/**
 * Exact one-sided tolerance factor, t'(confidence; n - 1, z_p √n)/√n by the noncentral t distribution.
 * Source: NIST/SEMATECH e-Handbook 7.2.6.3.
 */
export function oneSidedFactor(n: number, coverage: number, confidence: number): number {
  requireToleranceArguments(n, coverage, confidence)
  const root = Math.sqrt(n)
  return noncentralTQuantile(confidence, n - 1, normalQuantile(coverage) * root) / root
}

/**
 * Closed approximation of the one-sided factor, k = (z_p + √(z_p² - ab))/a; for comparison with print only.
 * null where the formula breaks down (very small n). Source: NIST/SEMATECH e-Handbook 7.2.6.3 (Natrella 1963).
 */
export function approximateOneSidedFactor(n: number, coverage: number, confidence: number): number | null {
  requireToleranceArguments(n, coverage, confidence)
  const zp = normalQuantile(coverage)
  const zc = normalQuantile(confidence)
  const a = 1 - zc * zc / (2 * (n - 1))
  const b = zp * zp - zc * zc / n
  const inside = zp * zp - a * b
  return a > 0 && inside >= 0 ? (zp + Math.sqrt(inside)) / a : null
}

export type ToleranceSide = 'two-sided' | 'lower' | 'upper'

/** A tolerance interval; on a one-sided one the open end is null. */
export type ToleranceInterval =
  | { factor: number, lower: number | null, upper: number | null, reason: null }
  | { factor: null, lower: null, upper: null, reason: string }

/**
 * Normal tolerance interval, m ± k s with the exact factor: holds `coverage` of the population with `confidence`.
 * @throws RangeError on a wrong argument.
 */
export function toleranceInterval(sample: MeanAndSpread, coverage: number, confidence: number, side: ToleranceSide = 'two-sided'): ToleranceInterval {
  requireMeanAndSpread(sample)
  requireOpenUnit(coverage, 'coverage')
  requireOpenUnit(confidence, 'confidence')
  const { n, mean, standardDeviation: s } = sample
  const none = (reason: string): ToleranceInterval => ({ factor: null, lower: null, upper: null, reason })
  if (n < 2 || s === null) return none('a tolerance interval needs at least two values')
  if (s === 0) return none('all values are equal: the spread is hidden by the resolution')
  const factor = side === 'two-sided' ? exactTwoSidedFactor(n, coverage, confidence) : oneSidedFactor(n, coverage, confidence)
  return {
    factor,
    lower: side === 'upper' ? null : mean - factor * s,
    upper: side === 'lower' ? null : mean + factor * s,
    reason: null,
  }
}

/** Confidence that the extremes of n values hold `coverage` of any distribution. */
function freeConfidence(n: number, coverage: number, sides: 1 | 2): number {
  const power = coverage ** n
  return sides === 1 ? 1 - power : 1 - n * coverage ** (n - 1) + (n - 1) * power
}

/**
 * Smallest number of values whose extremes (one of them, or both) hold `coverage` of any continuous distribution with `confidence`:
 * 1 - pⁿ ≥ γ, or 1 - n pⁿ⁻¹ + (n - 1) pⁿ ≥ γ.
 * Source: Wilks 1941; NIST/SEMATECH e-Handbook 7.2.6.4 (both from memory).
 */
export function distributionFreeSampleSize(coverage: number, confidence: number, sides: 1 | 2): number {
  requireOpenUnit(coverage, 'coverage')
  requireOpenUnit(confidence, 'confidence')
  let short = 1
  let enough = 2
  while (freeConfidence(enough, coverage, sides) < confidence) {
    short = enough
    enough *= 2
  }
  if (sides === 1 && freeConfidence(1, coverage, 1) >= confidence) return 1
  while (enough - short > 1) {
    const middle = Math.floor((short + enough) / 2)
    if (freeConfidence(middle, coverage, sides) < confidence) short = middle
    else enough = middle
  }
  return enough
}

/**
 * Tolerance interval from the extremes alone, without a claim about the distribution. With too few values there is none,
 * and the reason says how many are missing.
 */
export function distributionFreeToleranceInterval(values: readonly number[], coverage: number, confidence: number): Interval {
  requireAllFinite(values, 'values')
  const needed = distributionFreeSampleSize(coverage, confidence, 2)
  if (values.length < needed) {
    return noInterval(`needs ${needed} values, ${needed - values.length} more than there are`)
  }
  let lower = values[0]!
  let upper = lower
  for (const value of values) {
    if (value < lower) lower = value
    if (value > upper) upper = value
  }
  return interval(lower, upper)
}
