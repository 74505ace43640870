import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  approximateOneSidedFactor, distributionFreeSampleSize, distributionFreeToleranceInterval, exactTwoSidedFactor, howeFactor,
  oneSidedFactor, toleranceInterval,
} from '#shared/statistics/tolerance'

describe('tolerance intervals', () => {
  it('have an exact factor near the approximate one, nearer with n', () => {
    expect(Math.abs(exactTwoSidedFactor(3, 0.95, 0.95) / howeFactor(3, 0.95, 0.95) - 1)).toBeLessThan(0.03)
    expect(Math.abs(exactTwoSidedFactor(500, 0.95, 0.95) / howeFactor(500, 0.95, 0.95) - 1)).toBeLessThan(1e-4)
  })

  it('print as the exact tables for the smallest batches (Odeh and Owen 1980, from memory; recomputed with scipy 1.17)', () => {
    expect(exactTwoSidedFactor(2, 0.95, 0.95)).toBeCloseTo(36.51921461206, 8)
    expect(exactTwoSidedFactor(3, 0.95, 0.95).toFixed(3)).toBe('9.789')
  })

  it('narrow with n, widen with coverage and confidence', () => {
    fc.assert(fc.property(fc.integer({ min: 3, max: 60 }), fc.double({ min: 0.6, max: 0.98, noNaN: true }), fc.double({ min: 0.6, max: 0.98, noNaN: true }), (n, p, c) => {
      for (const factor of [exactTwoSidedFactor, oneSidedFactor]) {
        const k = factor(n, p, c)
        expect(factor(n + 5, p, c)).toBeLessThan(k)
        expect(factor(n, p + 0.01, c)).toBeGreaterThan(k)
        expect(factor(n, p, c + 0.01)).toBeGreaterThan(k)
      }
    }), { numRuns: 8 })
  })

  it('are open at one end when one-sided', () => {
    const sample = { n: 10, mean: 99, standardDeviation: 0.5 }
    const k = oneSidedFactor(10, 0.95, 0.95)
    expect(toleranceInterval(sample, 0.95, 0.95, 'lower')).toEqual({ factor: k, lower: 99 - k * 0.5, upper: null, reason: null })
    expect(toleranceInterval(sample, 0.95, 0.95, 'upper')).toMatchObject({ lower: null, upper: 99 + k * 0.5 })
    const both = toleranceInterval(sample, 0.95, 0.95)
    expect(99 - both.lower!).toBeCloseTo(both.upper! - 99, 12)
  })

  it('are refused with a reason', () => {
    expect(toleranceInterval({ n: 1, mean: 1, standardDeviation: null }, 0.95, 0.95).reason).toContain('two values')
    expect(toleranceInterval({ n: 9, mean: 1, standardDeviation: 0 }, 0.95, 0.95)).toMatchObject({ factor: null, lower: null, upper: null })
    expect(approximateOneSidedFactor(2, 0.9, 0.99)).toBeNull()
  })

  it('say how many values are missing without a distribution', () => {
    expect(distributionFreeToleranceInterval([3, 1, 2], 0.95, 0.95)).toEqual({ lower: null, upper: null, reason: 'needs 93 values, 90 more than there are' })
    const values = Array.from({ length: 93 }, (_, i) => (i * 7) % 93)
    expect(distributionFreeToleranceInterval(values, 0.95, 0.95)).toEqual({ lower: 0, upper: 92, reason: null })
  })

  it('need the smallest n that reaches the confidence', () => {
    fc.assert(fc.property(fc.double({ min: 0.05, max: 0.99, noNaN: true }), fc.double({ min: 0.05, max: 0.99, noNaN: true }), (p, c) => {
      const one = distributionFreeSampleSize(p, c, 1)
      expect(1 - p ** one).toBeGreaterThanOrEqual(c)
      if (one > 1) expect(1 - p ** (one - 1)).toBeLessThan(c)
      expect(distributionFreeSampleSize(p, c, 2)).toBeGreaterThan(one)
    }))
  })

  it('refuse a wrong argument', () => {
    expect(() => exactTwoSidedFactor(1, 0.9, 0.9)).toThrow('n must')
    expect(() => oneSidedFactor(5, 1, 0.9)).toThrow('coverage')
    expect(() => howeFactor(5, 0.9, NaN)).toThrow('confidence')
  })
})
