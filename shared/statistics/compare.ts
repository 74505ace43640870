import { holm } from './adjust'
import { summarise, type PartialSummary } from './describe'
import { chiSquareUpper, tQuantile, tTwoSided } from './distributions'
import { logGamma } from './gamma'
import { requireAllFinite, requireOpenUnit, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'

export interface Welch {
  /** Mean of the first minus mean of the second. */
  difference: number | null
  interval: Interval
  t: number | null
  df: number | null
  /** Two-sided. */
  p: number | null
  /** Difference in pooled standard deviations, corrected for small numbers (Hedges' g). */
  effect: number | null
  reason: string | null
}

/** Hedges' g with the exact correction; Hedges 1981, J. Educational Statistics 6, 107 (from memory). */
function hedges(a: PartialSummary, b: PartialSummary): number | null {
  const df = a.n + b.n - 2
  const pooled = Math.sqrt((a.m2 + b.m2) / df)
  if (pooled === 0 || df < 2) return null
  const correction = Math.exp(logGamma(df / 2) - logGamma((df - 1) / 2)) / Math.sqrt(df / 2)
  return correction * (a.mean! - b.mean!) / pooled
}

/**
 * Welch's t test of two means without the assumption of equal spread, two-sided.
 * Source: Welch 1947, Biometrika 34, 28; NIST/SEMATECH e-Handbook 1.3.5.3 (both from memory).
 * @throws RangeError on NaN or infinity or a wrong confidence.
 */
export function welch(first: readonly number[], second: readonly number[], confidence: number): Welch {
  requireOpenUnit(confidence, 'confidence')
  requireAllFinite(first, 'first')
  requireAllFinite(second, 'second')
  const a = summarise(first)
  const b = summarise(second)
  const none = (reason: string, difference: number | null): Welch =>
    ({ difference, interval: noInterval(reason), t: null, df: null, p: null, effect: null, reason })
  if (a.n < 2 || b.n < 2) return none('each batch needs at least two values', a.n && b.n ? a.mean! - b.mean! : null)
  const difference = a.mean! - b.mean!
  if (a.m2 === 0 && b.m2 === 0) return none('neither batch has any spread', difference)
  const varianceA = a.m2 / (a.n - 1) / a.n
  const varianceB = b.m2 / (b.n - 1) / b.n
  const variance = varianceA + varianceB
  const t = difference / Math.sqrt(variance)
  const shareA = varianceA / variance
  const shareB = varianceB / variance
  const df = 1 / (shareA * shareA / (a.n - 1) + shareB * shareB / (b.n - 1))
  const half = tQuantile(1 - (1 - confidence) / 2, df) * Math.sqrt(variance)
  return {
    difference,
    interval: interval(difference - half, difference + half),
    t,
    df,
    p: tTwoSided(t, df),
    effect: hedges(a, b),
    reason: null,
  }
}

export interface KruskalWallis {
  /** Corrected for ties. */
  h: number | null
  df: number | null
  /** By the chi-square approximation. */
  p: number | null
  /** Share of the spread of the ranks explained, H (n + 1)/(n² - 1), 0 to 1 (epsilon squared). */
  effect: number | null
  reason: string | null
}

/**
 * Kruskal and Wallis' rank test of two or more groups, corrected for ties.
 * Source: Kruskal and Wallis 1952, J. Amer. Statist. Assoc. 47, 583; NIST/SEMATECH e-Handbook 7.4.1;
 * effect: Tomczak and Tomczak 2014, Trends in Sport Sciences 1, 19 (all from memory).
 * @throws RangeError on NaN or infinity.
 */
export function kruskalWallis(groups: readonly (readonly number[])[]): KruskalWallis {
  groups.forEach((group, i) => requireAllFinite(group, `groups[${i}]`))
  const none = (reason: string): KruskalWallis => ({ h: null, df: null, p: null, effect: null, reason })
  if (groups.length < 2) return none('needs at least two groups')
  if (groups.some(group => group.length === 0)) return none('a group is empty')
  const all = groups.flatMap((group, g) => group.map(value => ({ value, g }))).sort((a, b) => a.value - b.value)
  const n = all.length
  const rankSums = groups.map(() => 0)
  let ties = 0
  for (let i = 0; i < n;) {
    let j = i
    while (j < n && all[j]!.value === all[i]!.value) j += 1
    const rank = (i + 1 + j) / 2
    for (let k = i; k < j; k += 1) rankSums[all[k]!.g]! += rank
    const t = j - i
    ties += t * (t * t - 1)
    i = j
  }
  const whole = n * (n * n - 1)
  if (ties === whole) return none('all values are equal')
  // Ranks are centred first, so that many values leave no cancellation.
  const middle = (n + 1) / 2
  const spread = groups.reduce((sum, group, g) => sum + (rankSums[g]! - group.length * middle) ** 2 / group.length, 0)
  const h = 12 / (n * (n + 1)) * spread / (1 - ties / whole)
  const df = groups.length - 1
  const smallest = Math.min(...groups.map(group => group.length))
  return {
    h,
    df,
    p: chiSquareUpper(h, df),
    effect: Math.min(1, h * (n + 1) / (n * n - 1)),
    // Common rule for the chi-square approximation, NIST/SEMATECH e-Handbook 7.4.1 (from memory).
    reason: smallest < 5 ? 'with fewer than five values in a group the p is rough' : null,
  }
}

export interface Batch {
  name: string
  values: readonly number[]
}

export type DifferenceFound = 'difference' | 'no difference shown' | 'not enough data to tell'

export interface PairComparison {
  first: string
  second: string
  welch: Welch
  /** Holm's adjusted p over all pairs that could be tested. */
  adjustedP: number | null
  found: DifferenceFound
  /** One plain sentence. */
  words: string
}

export interface BatchComparison {
  overall: KruskalWallis
  pairs: PairComparison[]
  found: DifferenceFound
  words: string
}

/** Cohen 1988, Statistical Power Analysis, 2.2: 0.2 small, 0.5 medium, 0.8 large (from memory). */
function sizeWord(effect: number): string {
  const size = Math.abs(effect)
  return size < 0.2 ? 'very small' : size < 0.5 ? 'small' : size < 0.8 ? 'medium' : 'large'
}

function pairWords(first: string, second: string, test: Welch, found: DifferenceFound): string {
  if (found === 'not enough data to tell') return `${first} and ${second}: not enough data to tell (${test.reason}).`
  if (found === 'no difference shown') return `${first} and ${second}: no difference shown; that does not prove that there is none.`
  const direction = test.difference! > 0 ? 'higher' : 'lower'
  const size = test.effect === null ? '' : `, a ${sizeWord(test.effect)} difference beside the spread`
  return `${first} is ${direction} than ${second} on average${size}.`
}

/**
 * Two to six batches compared: all at once by ranks (Kruskal-Wallis), each pair by Welch's test with Holm's correction,
 * with effect sizes and plain words. The values of a batch must be independent: one per vehicle.
 * @param confidence of the intervals, for example 0.95; 1 - confidence is the level of the tests
 * @throws RangeError on NaN or infinity, a wrong confidence, or another number of batches.
 */
export function compareBatches(batches: readonly Batch[], confidence: number): BatchComparison {
  requireWhole(batches.length, 'number of batches', 2, 6)
  requireOpenUnit(confidence, 'confidence')
  const alpha = 1 - confidence
  const overall = kruskalWallis(batches.map(batch => batch.values))
  const tested = batches.flatMap((first, i) => batches.slice(i + 1).map(second => ({
    first: first.name,
    second: second.name,
    welch: welch(first.values, second.values, confidence),
  })))
  const testable = tested.filter(pair => pair.welch.p !== null)
  const adjusted = holm(testable.map(pair => pair.welch.p!))
  const pairs = tested.map((pair): PairComparison => {
    const place = testable.indexOf(pair)
    const adjustedP = place < 0 ? null : adjusted[place]!
    const found: DifferenceFound = adjustedP === null
      ? 'not enough data to tell'
      : adjustedP <= alpha ? 'difference' : 'no difference shown'
    return { ...pair, adjustedP, found, words: pairWords(pair.first, pair.second, pair.welch, found) }
  })
  const differing = pairs.filter(pair => pair.found === 'difference').length
  const found: DifferenceFound = overall.p === null
    ? 'not enough data to tell'
    : overall.p <= alpha || differing > 0 ? 'difference' : 'no difference shown'
  const words = found === 'not enough data to tell'
    ? `Not enough data to tell (${overall.reason}).`
    : found === 'no difference shown'
      ? 'No difference between the batches shown; that does not prove that there is none.'
      : differing === 0
        ? 'The batches differ as a whole, but no single pair stands out.'
        : `The batches differ: ${differing} of ${pairs.length} ${pairs.length === 1 ? 'pair' : 'pairs'}.`
  return { overall, pairs, found, words }
}
