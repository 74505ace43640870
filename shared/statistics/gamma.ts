import { requireNotNegative, requirePositive } from './guards'

const HALF_LOG_TWO_PI = 0.918938533204672741780329736406

/**
 * Error of Stirling's formula, d(x) with Gamma(x + 1) = sqrt(2 pi x) (x/e)^x exp(d(x)), for x > 0.
 * Asymptotic series from 15 up, d(x) = d(x + 1) + (x + 1/2) ln(1 + 1/x) - 1 below.
 * Source: Loader 2000, Fast and accurate computation of binomial probabilities (from memory); series DLMF 5.11.1.
 */
export function stirlingError(x: number): number {
  let shifted = x
  let error = 0
  while (shifted < 15) {
    error += (shifted + 0.5) * Math.log1p(1 / shifted) - 1
    shifted += 1
  }
  const r = 1 / (shifted * shifted)
  return error + (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r * (1 / 1680 - r * (1 / 1188 - r * (691 / 360360 - r / 156)))))) / shifted
}

/**
 * x ln(x/m) + m - x for positive x and m, without cancellation when they are close.
 * Source: Loader 2000 (the "deviance" term, from memory).
 */
export function devianceTerm(x: number, m: number): number {
  if (Math.abs(x - m) < 0.1 * (x + m)) {
    const v = (x - m) / (x + m)
    let sum = (x - m) * v
    let power = 2 * x * v
    const square = v * v
    for (let j = 1; j < 1000; j += 1) {
      power *= square
      const next = sum + power / (2 * j + 1)
      if (next === sum) return next
      sum = next
    }
    return sum
  }
  return x * Math.log(x / m) + m - x
}

/**
 * Natural logarithm of the gamma function for x > 0, about 15 digits.
 * @throws RangeError unless x is finite and positive.
 */
export function logGamma(x: number): number {
  requirePositive(x, 'x')
  let shifted = x
  let product = 1
  while (shifted < 15) {
    product *= shifted
    shifted += 1
  }
  return (shifted - 0.5) * Math.log(shifted) - shifted + HALF_LOG_TWO_PI + stirlingError(shifted) - Math.log(product)
}

/** x^a e^-x / Gamma(a + 1) for positive a and x. */
function poissonTerm(a: number, x: number): number {
  return Math.exp(-stirlingError(a) - devianceTerm(a, x)) / Math.sqrt(2 * Math.PI * a)
}

/** Power series of the lower incomplete gamma function, DLMF 8.11.4. */
function lowerSeries(a: number, x: number): number {
  let term = 1
  let sum = 1
  for (let n = 1; ; n += 1) {
    term *= x / (a + n)
    sum += term
    if (term < sum * 1e-17) return poissonTerm(a, x) * sum
  }
}

/** Continued fraction of the upper incomplete gamma function, DLMF 8.9.2, by Lentz's method. */
function upperFraction(a: number, x: number): number {
  const tiny = 1e-300
  let b = x + 1 - a
  let c = 1 / tiny
  let d = 1 / (Math.abs(b) < tiny ? tiny : b)
  let h = d
  for (let i = 1; i < 100_000; i += 1) {
    const an = -i * (i - a)
    b += 2
    d = an * d + b
    if (Math.abs(d) < tiny) d = tiny
    c = b + an / c
    if (Math.abs(c) < tiny) c = tiny
    d = 1 / d
    const step = d * c
    h *= step
    if (Math.abs(step - 1) < 1e-16) break
  }
  return poissonTerm(a, x) * a * h
}

/** Lower and upper regularised incomplete gamma function, P(a, x) and Q(a, x) = 1 - P(a, x). */
export interface GammaShares {
  lower: number
  upper: number
}

/**
 * Regularised incomplete gamma functions for a > 0, x >= 0; the smaller of the two keeps its relative accuracy.
 * Right to at least 12 digits up to a of some hundred thousands.
 * @throws RangeError outside that range.
 */
export function incompleteGamma(a: number, x: number): GammaShares {
  requirePositive(a, 'a')
  requireNotNegative(x, 'x')
  if (x === 0) return { lower: 0, upper: 1 }
  if (x < a + 1) {
    const lower = Math.min(1, lowerSeries(a, x))
    return { lower, upper: 1 - lower }
  }
  const upper = Math.min(1, upperFraction(a, x))
  return { lower: 1 - upper, upper }
}
