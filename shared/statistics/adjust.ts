import { requireUnit } from './guards'

function requireProbabilities(p: readonly number[]): void {
  p.forEach((value, i) => requireUnit(value, `p[${i}]`))
}

/**
 * Holm's adjusted p values, in the order given: the chance of even one false alarm among all comparisons.
 * Source: Holm 1979, Scand. J. Statist. 6, 65 (from memory).
 * @throws RangeError unless every p lies between 0 and 1.
 */
export function holm(p: readonly number[]): number[] {
  requireProbabilities(p)
  const order = p.map((_, i) => i).sort((a, b) => p[a]! - p[b]!)
  const adjusted = new Array<number>(p.length)
  let largest = 0
  order.forEach((at, rank) => {
    largest = Math.max(largest, Math.min(1, (p.length - rank) * p[at]!))
    adjusted[at] = largest
  })
  return adjusted
}

/**
 * Benjamini and Hochberg's adjusted p values, in the order given: the share of false alarms among those raised.
 * Source: Benjamini and Hochberg 1995, J. Roy. Statist. Soc. B 57, 289 (from memory).
 * @throws RangeError unless every p lies between 0 and 1.
 */
export function benjaminiHochberg(p: readonly number[]): number[] {
  requireProbabilities(p)
  const order = p.map((_, i) => i).sort((a, b) => p[b]! - p[a]!)
  const adjusted = new Array<number>(p.length)
  let smallest = 1
  order.forEach((at, fromTop) => {
    smallest = Math.min(smallest, p[at]! * p.length / (p.length - fromTop))
    adjusted[at] = smallest
  })
  return adjusted
}
