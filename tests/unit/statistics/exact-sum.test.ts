import { describe, expect, it } from 'vitest'
import { deviations, exactSum, pairMean, sumOfProducts, sumOfSquares } from '#shared/statistics/exact-sum'

describe('sums that keep what rounding drops', () => {
  it('adds small to large without loss', () => {
    expect(exactSum([1e16, 1, -1e16])).toBe(1)
    expect(exactSum(Array.from({ length: 10 }, () => 0.1))).toBe(1)
    expect(exactSum([])).toBe(0)
  })

  it('carries a mean finer than a double', () => {
    const values = [1e15, 1e15 + 1, 1e15 + 1]
    const mean = pairMean(values)
    expect(mean.high + mean.low).toBe(mean.high)
    expect(sumOfSquares(deviations(values, mean))).toBeCloseTo(2 / 3, 12)
  })

  it('multiplies pairwise', () => {
    expect(sumOfProducts([1, 2, 3], [4, 5, 6])).toBe(32)
  })
})
