import { oneWayAnova } from './anova'
import { standardDeviationOf, summarise } from './describe'
import { chiSquareCdf, chiSquareUpper } from './distributions'
import { requireAllFinite, requirePositive } from './guards'
import { median } from './quantiles'

export interface SpreadTest {
  statistic: number | null
  /** Degrees of freedom; the second only for an F statistic. */
  df: number | null
  dfWithin: number | null
  p: number | null
  reason: string | null
}

function noTest(reason: string): SpreadTest {
  return { statistic: null, df: null, dfWithin: null, p: null, reason }
}

/**
 * Bartlett's test of equal spread. Sensitive to non-normal values.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.7 (from memory).
 * @throws RangeError on NaN or infinity.
 */
export function bartlett(groups: readonly (readonly number[])[]): SpreadTest {
  groups.forEach((group, i) => requireAllFinite(group, `groups[${i}]`))
  if (groups.length < 2) return noTest('needs at least two groups')
  const summaries = groups.map(summarise)
  if (summaries.some(summary => summary.n < 2)) return noTest('every group needs at least two values')
  if (summaries.some(summary => summary.m2 === 0)) return noTest('a group has no spread: use the test with medians')
  const k = groups.length
  const df = summaries.reduce((sum, summary) => sum + summary.n - 1, 0)
  const pooled = summaries.reduce((sum, summary) => sum + summary.m2, 0) / df
  let numerator = 0
  let inverse = 0
  for (const { n, m2 } of summaries) {
    numerator += (n - 1) * Math.log(pooled / (m2 / (n - 1)))
    inverse += 1 / (n - 1)
  }
  // Rounding can leave a tiny negative where all spreads are equal.
  const statistic = Math.max(0, numerator / (1 + (inverse - 1 / df) / (3 * (k - 1))))
  return { statistic, df: k - 1, dfWithin: null, p: chiSquareUpper(statistic, k - 1), reason: null }
}

/**
 * Levene's test with medians (Brown and Forsythe): analysis of variance of the distances from the group's median.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.10 (from memory).
 * @throws RangeError on NaN or infinity.
 */
export function brownForsythe(groups: readonly (readonly number[])[]): SpreadTest {
  groups.forEach((group, i) => requireAllFinite(group, `groups[${i}]`))
  if (groups.length < 2) return noTest('needs at least two groups')
  if (groups.some(group => group.length < 2)) return noTest('every group needs at least two values')
  const anova = oneWayAnova(groups.map((group) => {
    const middle = median(group)!
    return group.map(value => Math.abs(value - middle))
  }))
  if (anova.f === null) return noTest('no spread within the groups')
  return { statistic: anova.f, df: anova.dfBetween, dfWithin: anova.dfWithin, p: anova.p, reason: null }
}

export interface StandardDeviationTest {
  /** (n - 1) s²/σ₀². */
  statistic: number | null
  df: number | null
  /** P that the statistic is as small or smaller, as large or larger, and twice the smaller of the two. */
  pLower: number | null
  pUpper: number | null
  pTwoSided: number | null
  reason: string | null
}

/**
 * Chi-square test of a standard deviation against a given one, for normal values.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.8 (from memory).
 * @throws RangeError on NaN or infinity, or unless `against` is above 0.
 */
export function standardDeviationTest(values: readonly number[], against: number): StandardDeviationTest {
  requirePositive(against, 'against')
  const summary = summarise(values)
  const s = standardDeviationOf(summary)
  if (s === null) {
    return { statistic: null, df: null, pLower: null, pUpper: null, pTwoSided: null, reason: 'needs at least two values' }
  }
  const df = summary.n - 1
  const statistic = summary.m2 / (against * against)
  const pLower = chiSquareCdf(statistic, df)
  const pUpper = chiSquareUpper(statistic, df)
  return { statistic, df, pLower, pUpper, pTwoSided: Math.min(1, 2 * Math.min(pLower, pUpper)), reason: null }
}
