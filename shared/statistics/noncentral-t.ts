import { chiSquareQuantile, tQuantile } from './distributions'
import { devianceTerm, stirlingError } from './gamma'
import { requireFinite, requireOpenUnit, requirePositive } from './guards'
import { normalCdf } from './normal'
import { panelRule } from './quadrature'
import { findIncreasingRoot } from './roots'

/** Density of W = sqrt(chi-square with df degrees of freedom / df), w > 0. */
function spreadDensity(w: number, df: number): number {
  // df w f(df w^2) 2 with f the chi-square density, written by Loader's terms to keep digits at large df.
  const a = df / 2
  return 2 * a / w * Math.exp(-stirlingError(a) - devianceTerm(a, a * w * w)) / Math.sqrt(2 * Math.PI * a)
}

/**
 * Tails of the noncentral t distribution: T = (Z + delta)/W, so P(T <= t) is the mean of Phi(t W - delta).
 * All terms of the integral are positive, so that each tail keeps its accuracy.
 */
function noncentralTails(t: number, df: number, delta: number): { lower: number, upper: number } {
  const low = Math.sqrt(chiSquareQuantile(1e-18, df) / df)
  // The far end by a normal bound: beyond it the density is below anything a double notices.
  const high = Math.sqrt(1 + 13 * Math.sqrt(2 / df) + 90 / df)
  const breaks = [low, high]
  const turn = t === 0 ? 1 : delta / t
  const width = t === 0 ? 1 : Math.abs(1 / t)
  for (const at of [turn - 8 * width, turn - 2 * width, turn, turn + 2 * width, turn + 8 * width]) {
    if (at > low && at < high) breaks.push(at)
  }
  breaks.sort((a, b) => a - b)
  const rule = panelRule(breaks, 8)
  let lower = 0
  let upper = 0
  rule.points.forEach((w, i) => {
    const weight = rule.weights[i]! * spreadDensity(w, df)
    lower += weight * normalCdf(t * w - delta)
    upper += weight * normalCdf(delta - t * w)
  })
  return { lower: Math.min(1, lower), upper: Math.min(1, upper) }
}

function requireArguments(df: number, delta: number): void {
  requirePositive(df, 'df')
  if (df < 1) throw new RangeError(`df must be at least 1, not ${df}`)
  requireFinite(delta, 'delta')
}

/**
 * P(T <= t) of the noncentral t distribution with df >= 1 degrees of freedom and noncentrality delta.
 * Definition: Johnson and Kotz, Continuous Univariate Distributions 2, chapter 31 (from memory); integrated numerically, about 12 digits.
 * @throws RangeError on NaN, infinity or df below 1.
 */
export function noncentralTCdf(t: number, df: number, delta: number): number {
  requireFinite(t, 't')
  requireArguments(df, delta)
  return noncentralTails(t, df, delta).lower
}

/** P(T > t), see `noncentralTCdf`. */
export function noncentralTUpper(t: number, df: number, delta: number): number {
  requireFinite(t, 't')
  requireArguments(df, delta)
  return noncentralTails(t, df, delta).upper
}

/** Difference of a tail from its target, on the logarithm of the smaller tail; increases with the lower tail. */
function gapOf(tails: { lower: number, upper: number }, p: number): number {
  return p <= 0.5
    ? Math.log(Math.max(tails.lower, Number.MIN_VALUE)) - Math.log(p)
    : Math.log(1 - p) - Math.log(Math.max(tails.upper, Number.MIN_VALUE))
}

/** Quantile of the noncentral t distribution. @throws RangeError unless 0 < p < 1, df >= 1 and delta finite. */
export function noncentralTQuantile(p: number, df: number, delta: number): number {
  requireOpenUnit(p, 'p')
  requireArguments(df, delta)
  const start = delta + tQuantile(p, df)
  return findIncreasingRoot(t => gapOf(noncentralTails(t, df, delta), p), start, 0.1 * (1 + Math.abs(start)), 1e12)
}

/**
 * The noncentrality for which P(T <= t) = p; it falls as p rises.
 * @throws RangeError unless 0 < p < 1, df >= 1 and t finite.
 */
export function noncentralityFor(p: number, t: number, df: number): number {
  requireOpenUnit(p, 'p')
  requireFinite(t, 't')
  requireArguments(df, 0)
  return -findIncreasingRoot(minus => gapOf(noncentralTails(t, df, -minus), p), -t, 0.1 * (1 + Math.abs(t)), 1e9)
}
