import { deviations, pairMean, sumOfProducts, sumOfSquares } from './exact-sum'
import { requireAllFinite, requirePositive } from './guards'
import { standardDeviationOf, summarise } from './describe'
import { normalCdf, normalQuantile } from './normal'

export interface AndersonDarling {
  n: number
  /** A², mean and standard deviation estimated. */
  statistic: number | null
  /** A² (1 + 4/n - 25/n²), the form that the e-Handbook prints. */
  adjusted: number | null
  /** By Stephens' approximation, with A² (1 + 0.75/n + 2.25/n²). */
  p: number | null
  /** Why there is none, or what makes the doubt itself doubtful. */
  reason: string | null
}

/** p of Stephens' modified A*², D'Agostino and Stephens 1986, table 4.9 (from memory). */
function stephensP(a: number): number {
  if (a >= 13) return 0
  if (a >= 0.6) return Math.exp(1.2937 - 5.709 * a + 0.0186 * a * a)
  if (a >= 0.34) return Math.exp(0.9177 - 4.279 * a - 1.38 * a * a)
  if (a >= 0.2) return 1 - Math.exp(-8.318 + 42.796 * a - 59.938 * a * a)
  return 1 - Math.exp(-13.436 + 101.14 * a - 223.73 * a * a)
}

/**
 * Anderson-Darling test of normality.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.14 (from memory).
 * @param resolution step of the display in the units of the values. A coarse step alone makes the test fail; when it is
 *   more than half the standard deviation the result says so (common practice, no source).
 * @throws RangeError on NaN or infinity.
 */
export function andersonDarling(values: readonly number[], resolution?: number): AndersonDarling {
  if (resolution !== undefined) requirePositive(resolution, 'resolution')
  const summary = summarise(values)
  const n = summary.n
  const none = (reason: string): AndersonDarling => ({ n, statistic: null, adjusted: null, p: null, reason })
  if (n < 3) return none('needs at least three values')
  const s = standardDeviationOf(summary)!
  if (s === 0) return none('all values are equal')
  const z = deviations([...values].sort((a, b) => a - b), pairMean(values))
  let sum = 0
  for (let i = 0; i < n; i += 1) {
    const low = Math.log(Math.max(normalCdf(z[i]! / s), Number.MIN_VALUE))
    const high = Math.log(Math.max(normalCdf(-z[n - 1 - i]! / s), Number.MIN_VALUE))
    sum += (2 * i + 1) * (low + high)
  }
  const statistic = -n - sum / n
  return {
    n,
    statistic,
    adjusted: statistic * (1 + 4 / n - 25 / (n * n)),
    p: stephensP(statistic * (1 + 0.75 / n + 2.25 / (n * n))),
    reason: resolution !== undefined && resolution > s / 2
      ? 'the display step is coarse beside the spread: that alone can make the test fail'
      : n < 8 ? 'with fewer than eight values little is found' : null,
  }
}

export interface ProbabilityPlotPoint {
  /** Theoretical quantile of the standard normal distribution. */
  theoretical: number
  value: number
}

export interface NormalProbabilityPlot {
  /** Sorted; empty when there are no values. */
  points: ProbabilityPlotPoint[]
  /** Correlation of the points; null below three values or without spread. */
  correlation: number | null
  /** Line through the points for drawing: value = intercept + slope × theoretical. */
  intercept: number | null
  slope: number | null
}

/** Uniform order statistic median of rank i of n (from 1), Filliben 1975. */
function plottingPosition(i: number, n: number): number {
  if (n === 1) return 0.5
  const last = 0.5 ** (1 / n)
  if (i === 1) return 1 - last
  if (i === n) return last
  return (i - 0.3175) / (n + 0.365)
}

/**
 * Points of a normal probability plot with Filliben's positions, and their correlation.
 * Source: Filliben 1975; NIST/SEMATECH e-Handbook 1.3.3.21 and 1.3.3.22 (all from memory).
 * @throws RangeError on NaN or infinity.
 */
export function normalProbabilityPlot(values: readonly number[]): NormalProbabilityPlot {
  requireAllFinite(values, 'values')
  const n = values.length
  const points = Array.from(Float64Array.from(values).sort(), (value, i) => ({
    theoretical: normalQuantile(plottingPosition(i + 1, n)),
    value,
  }))
  const summary = summarise(values)
  if (n < 3 || summary.m2 === 0) return { points, correlation: null, intercept: null, slope: null }
  const x = points.map(point => point.theoretical)
  const dx = deviations(x, pairMean(x))
  const dy = deviations(points.map(point => point.value), pairMean(values))
  const slope = sumOfProducts(dx, dy) / sumOfSquares(dx)
  return {
    points,
    correlation: sumOfProducts(dx, dy) / Math.sqrt(sumOfSquares(dx) * summary.m2),
    intercept: summary.mean! - slope * pairMean(x).high,
    slope,
  }
}
