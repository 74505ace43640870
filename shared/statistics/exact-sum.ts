/**
 * Sums that keep what rounding drops. A number is carried as an unevaluated pair high + low,
 * about 32 significant digits, so that a mean is right to the last digit of a double and
 * deviations from it are not spoiled by its rounding.
 * Source: Knuth, The Art of Computer Programming vol. 2, 4.2.2 theorem B (two-sum, from memory);
 * Dekker 1971, A floating-point technique for extending the available precision (from memory).
 */
export interface Pair {
  high: number
  low: number
}

/** Sum of `values` as a pair. */
export function pairSum(values: Iterable<number>): Pair {
  let high = 0
  let low = 0
  for (const value of values) {
    const sum = high + value
    const part = sum - high
    low += (high - (sum - part)) + (value - part)
    high = sum
  }
  const total = high + low
  return { high: total, low: (high - total) + low }
}

/** Sum of `values`, rounded once. */
export function exactSum(values: Iterable<number>): number {
  return pairSum(values).high
}

/** Mean of a non-empty list as a pair: the double nearest to it and the rest. */
export function pairMean(values: readonly number[]): Pair {
  const n = values.length
  const sum = pairSum(values)
  const high = sum.high / n
  const rest = pairSum(remainders(values, high))
  return { high, low: rest.high / n }
}

function* remainders(values: readonly number[], centre: number): Generator<number> {
  for (const value of values) yield value - centre
}

/** Deviations of `values` from a centre given as a pair. */
export function deviations(values: readonly number[], centre: Pair): number[] {
  return values.map(value => (value - centre.high) - centre.low)
}

/** Sum of products of two equally long lists. */
export function sumOfProducts(a: readonly number[], b: readonly number[]): number {
  return exactSum(a.map((value, i) => value * b[i]!))
}

/** Sum of squares. */
export function sumOfSquares(values: readonly number[]): number {
  return sumOfProducts(values, values)
}
