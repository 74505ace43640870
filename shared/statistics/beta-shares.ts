import { devianceTerm, stirlingError } from './gamma'
import { requirePositive, requireUnit } from './guards'

/** Lower and upper regularised incomplete beta function, I_x(a, b) and 1 - I_x(a, b). */
export interface BetaShares {
  lower: number
  upper: number
}

/** x^a y^b Gamma(a + b + 1) / (Gamma(a + 1) Gamma(b + 1)), y = 1 - x; Loader 2000 (from memory). */
function binomialTerm(a: number, b: number, x: number, y: number): number {
  const n = a + b
  const exponent = stirlingError(n) - stirlingError(a) - stirlingError(b) - devianceTerm(a, n * x) - devianceTerm(b, n * y)
  return Math.exp(exponent) * Math.sqrt(n / (2 * Math.PI * a * b))
}

/** Continued fraction DLMF 8.17.22 by Lentz's method; converges quickly for x below (a + 1)/(a + b + 2). */
function fraction(a: number, b: number, x: number): number {
  const tiny = 1e-300
  let c = 1
  let d = 1 - (a + b) * x / (a + 1)
  if (Math.abs(d) < tiny) d = tiny
  d = 1 / d
  let h = d
  for (let m = 1; m < 100_000; m += 1) {
    const even = m * (b - m) * x / ((a + 2 * m - 1) * (a + 2 * m))
    d = 1 + even * d
    if (Math.abs(d) < tiny) d = tiny
    c = 1 + even / c
    if (Math.abs(c) < tiny) c = tiny
    d = 1 / d
    h *= d * c
    const odd = -(a + m) * (a + b + m) * x / ((a + 2 * m) * (a + 2 * m + 1))
    d = 1 + odd * d
    if (Math.abs(d) < tiny) d = tiny
    c = 1 + odd / c
    if (Math.abs(c) < tiny) c = tiny
    d = 1 / d
    const step = d * c
    h *= step
    if (Math.abs(step - 1) < 1e-16) break
  }
  return h
}

/**
 * Regularised incomplete beta function for a, b > 0 with its complement. x and y = 1 - x are both taken,
 * so that a value next to 1 keeps its digits; the smaller share keeps its relative accuracy.
 * @throws RangeError outside that range.
 */
export function betaShares(a: number, b: number, x: number, y: number): BetaShares {
  requirePositive(a, 'a')
  requirePositive(b, 'b')
  requireUnit(x, 'x')
  requireUnit(y, 'y')
  if (x === 0) return { lower: 0, upper: 1 }
  if (y === 0) return { lower: 1, upper: 0 }
  const term = binomialTerm(a, b, x, y)
  if (x < (a + 1) / (a + b + 2)) {
    const lower = Math.min(1, term * b / (a + b) * fraction(a, b, x))
    return { lower, upper: 1 - lower }
  }
  const upper = Math.min(1, term * a / (a + b) * fraction(b, a, y))
  return { lower: 1 - upper, upper }
}
