import { betaShares } from './beta-shares'
import { incompleteGamma } from './gamma'
import { findIncreasingRoot } from './roots'
import { requireFinite, requireNotNegative, requireOpenUnit, requirePositive, requireUnit } from './guards'

/**
 * Distribution functions and quantiles of t, chi-square, F and beta.
 * Each distribution function comes with its upper tail, which keeps its accuracy where 1 minus the lower one would not.
 * Source: DLMF 8.2, 8.17 for the incomplete gamma and beta functions; NIST/SEMATECH e-Handbook 1.3.6.6 (from memory).
 */
interface Tails {
  lower: number
  upper: number
}

/**
 * Root of the distribution function for a probability, by the smaller tail on a logarithmic scale.
 * `tails` must increase with its argument, an unbounded coordinate such as the logarithm of the variable.
 */
function invert(tails: (u: number) => Tails, p: number, start: number): number {
  const byLower = p <= 0.5
  const target = Math.log(byLower ? p : 1 - p)
  const gap = (u: number): number => {
    const { lower, upper } = tails(u)
    const tail = Math.log(Math.max(byLower ? lower : upper, Number.MIN_VALUE))
    return byLower ? tail - target : target - tail
  }
  return findIncreasingRoot(gap, start, 0.5, 1e6)
}

function betaTails(x: number, y: number, a: number, b: number): Tails {
  return betaShares(a, b, x, y)
}

/** P(X <= x) of the beta distribution with shapes a, b > 0. @throws RangeError outside the range of an argument. */
export function betaCdf(x: number, a: number, b: number): number {
  requireUnit(x, 'x')
  requirePositive(a, 'a')
  requirePositive(b, 'b')
  return betaTails(x, 1 - x, a, b).lower
}

/** Quantile of the beta distribution. @throws RangeError unless 0 < p < 1 and a, b > 0. */
export function betaQuantile(p: number, a: number, b: number): number {
  requireOpenUnit(p, 'p')
  requirePositive(a, 'a')
  requirePositive(b, 'b')
  // In the log odds, so that values next to 0 and to 1 keep their digits.
  const odds = invert(u => betaTails(1 / (1 + Math.exp(-u)), 1 / (1 + Math.exp(u)), a, b), p, Math.log(a / b))
  return 1 / (1 + Math.exp(-odds))
}

/** Both tails of the chi-square distribution with df > 0 degrees of freedom. */
function chiSquareTails(x: number, df: number): Tails {
  requireNotNegative(x, 'x')
  requirePositive(df, 'df')
  return incompleteGamma(df / 2, x / 2)
}

/** P(X <= x), chi-square with df degrees of freedom. @throws RangeError when x < 0 or df <= 0. */
export function chiSquareCdf(x: number, df: number): number {
  return chiSquareTails(x, df).lower
}

/** P(X > x), chi-square with df degrees of freedom. @throws RangeError when x < 0 or df <= 0. */
export function chiSquareUpper(x: number, df: number): number {
  return chiSquareTails(x, df).upper
}

/** Quantile of the chi-square distribution. @throws RangeError unless 0 < p < 1 and df > 0. */
export function chiSquareQuantile(p: number, df: number): number {
  requireOpenUnit(p, 'p')
  requirePositive(df, 'df')
  return Math.exp(invert(u => chiSquareTails(Math.exp(u), df), p, Math.log(df)))
}

/** Both tails of the F distribution. */
function fTails(x: number, df1: number, df2: number): Tails {
  requireNotNegative(x, 'x')
  requirePositive(df1, 'df1')
  requirePositive(df2, 'df2')
  const whole = df1 * x + df2
  return betaTails(df1 * x / whole, df2 / whole, df1 / 2, df2 / 2)
}

/** P(X <= x), F with df1 and df2 degrees of freedom. @throws RangeError when x < 0 or a df <= 0. */
export function fCdf(x: number, df1: number, df2: number): number {
  return fTails(x, df1, df2).lower
}

/** P(X > x), F with df1 and df2 degrees of freedom. @throws RangeError when x < 0 or a df <= 0. */
export function fUpper(x: number, df1: number, df2: number): number {
  return fTails(x, df1, df2).upper
}

/** Quantile of the F distribution. @throws RangeError unless 0 < p < 1 and both df > 0. */
export function fQuantile(p: number, df1: number, df2: number): number {
  requireOpenUnit(p, 'p')
  requirePositive(df1, 'df1')
  requirePositive(df2, 'df2')
  return Math.exp(invert(u => fTails(Math.exp(u), df1, df2), p, 0))
}

/** P(|T| <= size) and P(|T| > size) of the t distribution. */
function tCentre(size: number, df: number): Tails {
  const square = size * size
  const whole = df + square
  return betaTails(square / whole, df / whole, 0.5, df / 2)
}

/** P(T <= t), Student's t with df > 0 degrees of freedom (not necessarily whole). @throws RangeError on NaN, infinity, df <= 0. */
export function tCdf(t: number, df: number): number {
  requireFinite(t, 't')
  requirePositive(df, 'df')
  const { lower, upper } = tCentre(t, df)
  return t < 0 ? upper / 2 : 0.5 + lower / 2
}

/** Two-sided p value P(|T| > |t|). @throws RangeError on NaN, infinity, df <= 0. */
export function tTwoSided(t: number, df: number): number {
  requireFinite(t, 't')
  requirePositive(df, 'df')
  return tCentre(t, df).upper
}

/** Quantile of Student's t. @throws RangeError unless 0 < p < 1 and df > 0. */
export function tQuantile(p: number, df: number): number {
  requireOpenUnit(p, 'p')
  requirePositive(df, 'df')
  if (p === 0.5) return 0
  // Half the line suffices by symmetry: the share inside (-t, t) is |2p - 1|, outside twice the smaller tail.
  const inside = Math.abs(2 * p - 1)
  const outside = 2 * Math.min(p, 1 - p)
  const byInside = inside <= 0.5
  const target = Math.log(byInside ? inside : outside)
  const gap = (u: number): number => {
    const { lower, upper } = tCentre(Math.exp(u), df)
    const share = Math.log(Math.max(byInside ? lower : upper, Number.MIN_VALUE))
    return byInside ? share - target : target - share
  }
  const size = Math.exp(findIncreasingRoot(gap, 0, 0.5, 1e6))
  return p < 0.5 ? -size : size
}
