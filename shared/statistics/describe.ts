import { deviations, pairMean, sumOfProducts, sumOfSquares } from './exact-sum'
import { requireAllFinite, requireFinite, requireNotNegative, requireWhole } from './guards'
import { median } from './quantiles'

/** What has to be kept of a group of values so that groups can be merged: n, mean, sum of squared deviations. */
export interface PartialSummary {
  n: number
  /** null when n is 0. */
  mean: number | null
  /** Sum of squared deviations from the mean, in squared units of the values. */
  m2: number
}

export const EMPTY_SUMMARY: PartialSummary = { n: 0, mean: null, m2: 0 }

/**
 * One more value into a running summary.
 * Source: Welford 1962, Technometrics 4, 419 (from memory).
 * @throws RangeError when the value is NaN or infinite.
 */
export function addToSummary(summary: PartialSummary, value: number): PartialSummary {
  requireFinite(value, 'value')
  const n = summary.n + 1
  const before = summary.mean ?? 0
  const delta = value - before
  const mean = summary.mean === null ? value : before + delta / n
  return { n, mean, m2: summary.mean === null ? 0 : summary.m2 + delta * (value - mean) }
}

/**
 * Summary of a list in two passes, the mean carried to twice the digits of a double, so that the
 * certified values of NIST StRD are met as far as the rounding of the data on input allows.
 * @throws RangeError on NaN or infinity.
 */
export function summarise(values: readonly number[]): PartialSummary {
  requireAllFinite(values, 'values')
  if (values.length === 0) return EMPTY_SUMMARY
  const first = values[0]!
  // Equal values must give a spread of exactly 0.
  if (values.every(value => value === first)) return { n: values.length, mean: first, m2: 0 }
  const mean = pairMean(values)
  const m2 = sumOfSquares(deviations(values, mean))
  requireFinite(m2, 'sum of squared deviations of values')
  return { n: values.length, mean: mean.high, m2 }
}

/**
 * Merge summaries of separate groups. An empty part changes nothing; a value can't be taken out
 * again, that needs a recount.
 * Source: Chan, Golub and LeVeque 1983, The American Statistician 37, 242 (from memory).
 * @throws RangeError when a part is not a summary.
 */
export function mergeSummaries(parts: readonly PartialSummary[]): PartialSummary {
  let merged = EMPTY_SUMMARY
  parts.forEach((part, i) => {
    requireWhole(part.n, `parts[${i}].n`, 0)
    requireNotNegative(part.m2, `parts[${i}].m2`)
    if (part.n === 0) return
    if (part.mean === null) throw new RangeError(`parts[${i}].mean must be a number when n is above 0`)
    requireFinite(part.mean, `parts[${i}].mean`)
    if (merged.mean === null) {
      merged = { n: part.n, mean: part.mean, m2: part.m2 }
      return
    }
    const n = merged.n + part.n
    const delta = part.mean - merged.mean
    merged = {
      n,
      mean: merged.mean + delta * part.n / n,
      m2: merged.m2 + part.m2 + delta * delta * merged.n * part.n / n,
    }
  })
  return merged
}

/** Sample standard deviation (divisor n - 1); null below two values, where there is none. */
export function standardDeviationOf(summary: PartialSummary): number | null {
  return summary.n < 2 ? null : Math.sqrt(summary.m2 / (summary.n - 1))
}

/** Mean of a list; null when it is empty. */
export function mean(values: readonly number[]): number | null {
  return summarise(values).mean
}

/** Sample standard deviation of a list; null below two values. */
export function standardDeviation(values: readonly number[]): number | null {
  return standardDeviationOf(summarise(values))
}

/**
 * Lag-1 autocorrelation, sum of (x_i - m)(x_{i+1} - m) over the sum of (x_i - m) squared, values in order of time.
 * null below two values or without spread. Source: NIST StRD univariate; NIST/SEMATECH e-Handbook 1.3.5.12 (from memory).
 */
export function lag1Autocorrelation(values: readonly number[]): number | null {
  const summary = summarise(values)
  if (summary.n < 2 || summary.m2 === 0) return null
  const d = deviations(values, pairMean(values))
  return sumOfProducts(d.slice(0, -1), d.slice(1)) / sumOfSquares(d)
}

export interface Description {
  n: number
  mean: number | null
  standardDeviation: number | null
  /** Standard deviation of the mean, s over the root of n. */
  standardError: number | null
  median: number | null
  minimum: number | null
  maximum: number | null
  range: number | null
  lag1: number | null
  /** Why something is null; null when nothing is. */
  reason: string | null
}

/**
 * The figures that describe a batch, in the units of the values.
 * Empty: all null. One value: a mean and no standard deviation (never 0).
 * @throws RangeError on NaN or infinity.
 */
export function describe(values: readonly number[]): Description {
  const summary = summarise(values)
  const n = summary.n
  if (n === 0) {
    return {
      n, mean: null, standardDeviation: null, standardError: null, median: null,
      minimum: null, maximum: null, range: null, lag1: null, reason: 'no values',
    }
  }
  let minimum = values[0]!
  let maximum = minimum
  for (const value of values) {
    if (value < minimum) minimum = value
    if (value > maximum) maximum = value
  }
  const sd = standardDeviationOf(summary)
  return {
    n,
    mean: summary.mean,
    standardDeviation: sd,
    standardError: sd === null ? null : sd / Math.sqrt(n),
    median: median(values),
    minimum,
    maximum,
    range: maximum - minimum,
    lag1: lag1Autocorrelation(values),
    reason: n === 1 ? 'one value has no spread' : summary.m2 === 0 ? 'all values are equal' : null,
  }
}
