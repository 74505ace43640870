import { deviations, exactSum, pairMean, sumOfProducts, sumOfSquares } from './exact-sum'
import { fUpper, tTwoSided } from './distributions'
import { requireAllFinite, requireSameLength } from './guards'

export interface StraightLine {
  n: number
  df: number
  intercept: number
  slope: number
  interceptStandardError: number | null
  slopeStandardError: number | null
  /** t against 0 and its two-sided p; null without residual spread. */
  interceptT: number | null
  interceptP: number | null
  slopeT: number | null
  slopeP: number | null
  residualStandardDeviation: number | null
  /** Proves nothing about the line being right: see `lackOfFit`. null when y has no spread. */
  rSquared: number | null
  residuals: number[]
  reason: string | null
}

export type StraightLineResult = StraightLine | { n: number, df: null, intercept: null, slope: null, reason: string }

/**
 * Least squares straight line y = intercept + slope x, centred before squaring.
 * Source: NIST/SEMATECH e-Handbook 4.4.3 (from memory); NIST StRD linear regression.
 * @throws RangeError on NaN or infinity, or lists of different length.
 */
export function straightLine(x: readonly number[], y: readonly number[]): StraightLineResult {
  requireAllFinite(x, 'x')
  requireAllFinite(y, 'y')
  requireSameLength(x, 'x', y, 'y')
  const n = x.length
  if (n < 2) return { n, df: null, intercept: null, slope: null, reason: 'a line needs at least two points' }
  const meanX = pairMean(x)
  const meanY = pairMean(y)
  const dx = deviations(x, meanX)
  const dy = deviations(y, meanY)
  const sxx = sumOfSquares(dx)
  if (x.every(value => value === x[0]) || sxx === 0) return { n, df: null, intercept: null, slope: null, reason: 'all x are equal' }
  const slope = sumOfProducts(dx, dy) / sxx
  const intercept = meanY.high - slope * meanX.high + (meanY.low - slope * meanX.low)
  const residuals = dx.map((d, i) => dy[i]! - slope * d)
  const df = n - 2
  const syy = sumOfSquares(dy)
  const residual = sumOfSquares(residuals)
  const base = { n, df, intercept, slope, residuals, rSquared: syy === 0 ? null : Math.max(0, 1 - residual / syy) }
  if (df === 0) {
    return {
      ...base, interceptStandardError: null, slopeStandardError: null, interceptT: null, interceptP: null,
      slopeT: null, slopeP: null, residualStandardDeviation: null, reason: 'two points leave nothing to judge the line by',
    }
  }
  const s = Math.sqrt(residual / df)
  const slopeStandardError = s / Math.sqrt(sxx)
  const interceptStandardError = s * Math.sqrt(1 / n + meanX.high * meanX.high / sxx)
  const interceptT = s === 0 ? null : intercept / interceptStandardError
  const slopeT = s === 0 ? null : slope / slopeStandardError
  return {
    ...base,
    interceptStandardError,
    slopeStandardError,
    interceptT,
    interceptP: interceptT === null ? null : tTwoSided(interceptT, df),
    slopeT,
    slopeP: slopeT === null ? null : tTwoSided(slopeT, df),
    residualStandardDeviation: s,
    reason: s === 0 ? 'the points lie exactly on the line' : null,
  }
}

export interface LackOfFit {
  f: number | null
  dfLack: number | null
  dfPure: number | null
  /** Small: the straight line is not enough. */
  p: number | null
  /** Standard deviation of the repeats alone. */
  pureStandardDeviation: number | null
  reason: string | null
}

/**
 * F test of a straight line against the scatter of repeats at equal x.
 * Source: NIST/SEMATECH e-Handbook 4.4.4.6 (from memory).
 * @throws RangeError on NaN or infinity, or lists of different length.
 */
export function lackOfFit(x: readonly number[], y: readonly number[]): LackOfFit {
  const none = (reason: string): LackOfFit => ({ f: null, dfLack: null, dfPure: null, p: null, pureStandardDeviation: null, reason })
  const line = straightLine(x, y)
  const levels = new Map<number, { x: number, y: number[] }>()
  x.forEach((value, i) => {
    const level = levels.get(value) ?? { x: value, y: [] }
    level.y.push(y[i]!)
    levels.set(value, level)
  })
  const dfLack = levels.size - 2
  const dfPure = x.length - levels.size
  if (line.slope === null || dfLack < 1) return none('needs at least three levels')
  if (dfPure < 1) return none('needs repeats at a level')
  const meanX = pairMean(x)
  const meanY = pairMean(y)
  const lack: number[] = []
  const pure: number[] = []
  for (const level of levels.values()) {
    const centre = pairMean(level.y)
    for (const d of deviations(level.y, centre)) pure.push(d * d)
    const dx = (level.x - meanX.high) - meanX.low
    const dy = (centre.high - meanY.high) + (centre.low - meanY.low)
    lack.push(level.y.length * (dy - line.slope * dx) ** 2)
  }
  const pureSquare = exactSum(pure) / dfPure
  if (pureSquare === 0) return { ...none('the repeats have no spread'), dfLack, dfPure, pureStandardDeviation: 0 }
  const f = exactSum(lack) / dfLack / pureSquare
  return { f, dfLack, dfPure, p: fUpper(f, dfLack, dfPure), pureStandardDeviation: Math.sqrt(pureSquare), reason: null }
}
