import { exactSum, pairMean, type Pair } from './exact-sum'
import { fUpper } from './distributions'
import { requireAllFinite } from './guards'

export interface OneWayAnova {
  groups: number
  n: number
  dfBetween: number
  dfWithin: number
  sumOfSquaresBetween: number
  sumOfSquaresWithin: number
  meanSquareBetween: number | null
  meanSquareWithin: number | null
  f: number | null
  p: number | null
  rSquared: number | null
  /** Root of the mean square within. */
  residualStandardDeviation: number | null
  reason: string | null
}

function squared(value: number): number {
  return value * value
}

/** Difference of two numbers carried as pairs. */
function difference(a: Pair, b: Pair): number {
  return (a.high - b.high) + (a.low - b.low)
}

/**
 * One-way analysis of variance. Deviations are taken before anything is squared, with means carried to twice the
 * digits of a double, so that many leading digits in common do no harm.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.4 (from memory); NIST StRD analysis of variance.
 * @throws RangeError on NaN or infinity.
 */
export function oneWayAnova(groups: readonly (readonly number[])[]): OneWayAnova {
  groups.forEach((group, i) => requireAllFinite(group, `groups[${i}]`))
  const filled = groups.filter(group => group.length > 0)
  const all = filled.flat()
  const n = all.length
  const k = filled.length
  const empty = { groups: k, n, dfBetween: Math.max(0, k - 1), dfWithin: n - k }
  if (k < 2 || n <= k) {
    return {
      ...empty, sumOfSquaresBetween: 0, sumOfSquaresWithin: 0, meanSquareBetween: null, meanSquareWithin: null,
      f: null, p: null, rSquared: null, residualStandardDeviation: null,
      reason: k < 2 ? 'needs at least two groups with values' : 'needs a group with at least two values',
    }
  }
  const grand = pairMean(all)
  const means = filled.map(pairMean)
  const between = exactSum(filled.map((group, i) => group.length * squared(difference(means[i]!, grand))))
  const within = exactSum(filled.flatMap((group, i) =>
    group.map(value => squared(difference({ high: value, low: 0 }, means[i]!)))))
  const meanSquareBetween = between / (k - 1)
  const meanSquareWithin = within / (n - k)
  const total = between + within
  const f = within === 0 ? null : meanSquareBetween / meanSquareWithin
  return {
    ...empty,
    sumOfSquaresBetween: between,
    sumOfSquaresWithin: within,
    meanSquareBetween,
    meanSquareWithin,
    f,
    p: f === null ? null : fUpper(f, k - 1, n - k),
    rSquared: total === 0 ? null : between / total,
    residualStandardDeviation: Math.sqrt(meanSquareWithin),
    reason: within === 0 ? 'no spread within the groups' : null,
  }
}
