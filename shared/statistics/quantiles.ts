import { requireAllFinite, requireUnit } from './guards'

/** Sample quantile definitions by their number in Hyndman and Fan 1996, The American Statistician 50, 361 (from memory). */
export type QuantileType = 6 | 7 | 8

/** To be printed beside every quantile: below about thirty values the definitions differ visibly. */
export const QUANTILE_TYPE_NAMES: Record<QuantileType, string> = {
  6: 'Hyndman-Fan type 6, position (n + 1) p',
  7: 'Hyndman-Fan type 7, position (n - 1) p + 1',
  8: 'Hyndman-Fan type 8, position (n + 1/3) p + 1/3',
}

/** Position of the quantile among the sorted values, counted from 1. */
function position(n: number, p: number, type: QuantileType): number {
  if (type === 6) return (n + 1) * p
  if (type === 7) return (n - 1) * p + 1
  return (n + 1 / 3) * p + 1 / 3
}

/**
 * Sample quantiles, in the units of the values, in the order of `probabilities`; linear between
 * neighbours, held at the smallest and the largest value. null for each when there are no values.
 * Type 6 is the one of NIST/SEMATECH e-Handbook 7.2.6.2 (from memory), type 7 the common default.
 * @throws RangeError on NaN or infinity, or on a probability outside 0 to 1.
 */
export function quantiles(values: readonly number[], probabilities: readonly number[], type: QuantileType = 7): (number | null)[] {
  requireAllFinite(values, 'values')
  probabilities.forEach((p, i) => requireUnit(p, `probabilities[${i}]`))
  const n = values.length
  if (n === 0) return probabilities.map(() => null)
  const sorted = Float64Array.from(values).sort()
  return probabilities.map((p) => {
    const h = Math.min(Math.max(position(n, p, type), 1), n)
    const below = Math.floor(h)
    const low = sorted[below - 1]!
    const share = h - below
    if (share === 0) return low
    const high = sorted[below]!
    return Math.min(high, low + share * (high - low))
  })
}

/** One sample quantile; see `quantiles`. */
export function quantile(values: readonly number[], p: number, type: QuantileType = 7): number | null {
  return quantiles(values, [p], type)[0]!
}

/** The middle value, or the mean of the two in the middle; null when there are no values. */
export function median(values: readonly number[]): number | null {
  return quantile(values, 0.5, 7)
}
