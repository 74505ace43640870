import { lag1Autocorrelation } from './describe'
import { normalCdf, normalQuantile } from './normal'
import { requireAllFinite, requireOpenUnit, requireSameLength, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'
import { median } from './quantiles'

/** Below this number of values no trend is judged (common practice, no source). */
export const FEWEST_FOR_TREND = 8

/** Sizes of the groups of equal values. */
function tieSizes(values: readonly number[]): number[] {
  const counts = new Map<number, number>()
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1)
  return [...counts.values()].filter(size => size > 1)
}

function tieTerm(values: readonly number[]): number {
  return tieSizes(values).reduce((sum, t) => sum + t * (t - 1) * (2 * t + 5), 0)
}

export interface MannKendall {
  n: number
  /** Sum of the signs of all later minus earlier values. */
  s: number
  varianceOfS: number
  /** With the correction for continuity. */
  z: number
  /** Two-sided. */
  p: number
  /** S over the number of pairs, -1 to 1; null below two values. */
  tau: number | null
  reason: string | null
}

/**
 * Mann-Kendall test for a monotone trend, with the corrections for ties and continuity. All values equal: z 0, p 1.
 * Source: Mann 1945, Econometrica 13, 245; Kendall 1975; Gilbert 1987, chapter 16 (all from memory).
 * @param values in order of time
 * @throws RangeError on NaN or infinity.
 */
export function mannKendall(values: readonly number[]): MannKendall {
  requireAllFinite(values, 'values')
  const n = values.length
  let s = 0
  for (let i = 0; i < n; i += 1) {
    for (let j = i + 1; j < n; j += 1) s += Math.sign(values[j]! - values[i]!)
  }
  const varianceOfS = (n * (n - 1) * (2 * n + 5) - tieTerm(values)) / 18
  const z = s === 0 || varianceOfS === 0 ? 0 : (s - Math.sign(s)) / Math.sqrt(varianceOfS)
  return {
    n,
    s,
    varianceOfS,
    z,
    p: Math.min(1, 2 * normalCdf(-Math.abs(z))),
    tau: n < 2 ? null : s / (n * (n - 1) / 2),
    reason: n < FEWEST_FOR_TREND ? 'not enough data to tell' : null,
  }
}

export interface TheilSen {
  n: number
  /** Median of the slopes between all pairs at different times, in units of y per unit of x. */
  slope: number | null
  /** Median of y minus slope times median of x (Conover's convention, one of the two in use). */
  intercept: number | null
  interval: Interval
  reason: string | null
}

/**
 * Theil-Sen slope with the interval from the ranked slopes. Pairs at equal times are left out.
 * Source: Sen 1968, J. Amer. Statist. Assoc. 63, 1379 (its example reproduced); ties in the variance: Kendall 1975 (from memory).
 * @param x times, in any order
 * @throws RangeError on NaN or infinity, lists of different length, or a wrong confidence.
 */
export function theilSen(x: readonly number[], y: readonly number[], confidence: number): TheilSen {
  requireAllFinite(x, 'x')
  requireAllFinite(y, 'y')
  requireSameLength(x, 'x', y, 'y')
  requireOpenUnit(confidence, 'confidence')
  const n = x.length
  const found: number[] = []
  for (let i = 0; i < n; i += 1) {
    for (let j = i + 1; j < n; j += 1) {
      const run = x[j]! - x[i]!
      if (run !== 0) found.push((y[j]! - y[i]!) / run)
    }
  }
  if (found.length === 0) {
    const reason = 'a slope needs values at two different times'
    return { n, slope: null, intercept: null, interval: noInterval(reason), reason }
  }
  const slopes = Float64Array.from(found).sort()
  // Plus 0 turns a -0 into 0.
  const slope = median(found)! + 0
  const variance = (n * (n - 1) * (2 * n + 5) - tieTerm(x) - tieTerm(y)) / 18
  const reach = -normalQuantile((1 - confidence) / 2) * Math.sqrt(Math.max(0, variance))
  // Ranks rounded to the nearest; held at the extremes, where few values allow no narrower interval.
  const lower = Math.max(0, Math.round((slopes.length - reach) / 2) - 1)
  const upper = Math.min(slopes.length - 1, Math.round((slopes.length + reach) / 2))
  return {
    n,
    slope,
    intercept: median(y)! - slope * median(x)!,
    interval: interval(slopes[lower]!, slopes[upper]!),
    reason: n < FEWEST_FOR_TREND ? 'not enough data to tell' : null,
  }
}

export type TrendFound = 'rising' | 'falling' | 'no trend shown' | 'not enough data to tell'

export interface Trend {
  mannKendall: MannKendall
  theilSen: TheilSen
  /** Lag-1 autocorrelation of the values in time; null without spread. */
  lag1: number | null
  found: TrendFound
  /** What makes the p too small or the slope doubtful. */
  cautions: string[]
}

/**
 * Monotone trend of values over time: test, slope and plain finding.
 * Serial correlation makes p too small; values below detection must all stand at their limit, where they tie.
 * @throws RangeError on NaN or infinity, lists of different length, or a wrong confidence.
 */
export function trend(x: readonly number[], y: readonly number[], confidence: number): Trend {
  requireSameLength(x, 'x', y, 'y')
  const slope = theilSen(x, y, confidence)
  const order = x.map((_, i) => i).sort((a, b) => x[a]! - x[b]!)
  const inTime = order.map(i => y[i]!)
  const test = mannKendall(inTime)
  const lag1 = lag1Autocorrelation(inTime)
  const n = y.length
  const cautions: string[] = []
  // Twice the standard error 1/√n of white noise, NIST/SEMATECH e-Handbook 1.3.3.1 (from memory).
  if (lag1 !== null && Math.abs(lag1) > 2 / Math.sqrt(n)) cautions.push('neighbouring values go together, which makes p too small')
  if (new Set(x).size < n) cautions.push('several values at one time: their order is taken as given')
  const found: TrendFound = n < FEWEST_FOR_TREND
    ? 'not enough data to tell'
    : test.p > 1 - confidence ? 'no trend shown' : test.s > 0 ? 'rising' : 'falling'
  return { mannKendall: test, theilSen: slope, lag1, found, cautions }
}

export interface ShareTrend {
  z: number | null
  /** Two-sided. */
  p: number | null
  found: TrendFound
  reason: string | null
}

/**
 * Trend of a share over ordered groups (months): Cochran and Armitage's test with equally spaced or given scores.
 * Source: Armitage 1955, Biometrics 11, 375 (from memory).
 * @param x how many of each group have the property
 * @param n size of each group; empty groups are passed over
 * @throws RangeError on wrong counts, scores or confidence.
 */
export function shareTrend(x: readonly number[], n: readonly number[], confidence: number, scores: readonly number[] = x.map((_, i) => i)): ShareTrend {
  requireSameLength(x, 'x', n, 'n')
  requireSameLength(x, 'x', scores, 'scores')
  requireAllFinite(scores, 'scores')
  requireOpenUnit(confidence, 'confidence')
  n.forEach((size, i) => {
    requireWhole(size, `n[${i}]`, 0)
    requireWhole(x[i]!, `x[${i}]`, 0, size)
  })
  const none = (reason: string): ShareTrend => ({ z: null, p: null, found: 'not enough data to tell', reason })
  const total = n.reduce((sum, size) => sum + size, 0)
  const hits = x.reduce((sum, count) => sum + count, 0)
  if (n.filter(size => size > 0).length < 3) return none('needs at least three groups')
  const share = hits / total
  if (share === 0 || share === 1) return none(share === 0 ? 'none in any group' : 'all in every group')
  const centre = scores.reduce((sum, score, i) => sum + score * n[i]!, 0) / total
  const slope = scores.reduce((sum, score, i) => sum + (score - centre) * (x[i]! - n[i]! * share), 0)
  const spread = share * (1 - share) * scores.reduce((sum, score, i) => sum + n[i]! * (score - centre) ** 2, 0)
  if (spread === 0) return none('all scores are equal')
  const z = slope / Math.sqrt(spread)
  const p = Math.min(1, 2 * normalCdf(-Math.abs(z)))
  // The normal approximation wants about five with and five without (common practice, no source).
  if (Math.min(hits, total - hits) < 5) return { z, p, found: 'not enough data to tell', reason: 'fewer than five with or without the property' }
  return { z, p, found: p > 1 - confidence ? 'no trend shown' : z > 0 ? 'rising' : 'falling', reason: null }
}
