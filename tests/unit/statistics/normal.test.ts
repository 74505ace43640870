import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { incompleteGamma } from '#shared/statistics/gamma'
import { erfc, normalCdf, normalQuantile, normalUpper } from '#shared/statistics/normal'

describe('the normal distribution', () => {
  it('agrees with the incomplete gamma function to its last digits, far into the tail', () => {
    for (let x = 0; x <= 25; x += 0.037) {
      const reference = incompleteGamma(0.5, x * x).upper
      // exp(−x²) makes x² times the rounding of its argument, which the reference squares plainly.
      expect(Math.abs(erfc(x) / reference - 1), `erfc(${x})`).toBeLessThan(1e-14 + x * x * 2 ** -51)
    }
  })

  it('has symmetric tails, and a quantile that undoes the probability', () => {
    fc.assert(fc.property(fc.double({ min: -8, max: 8, noNaN: true }), (z) => {
      expect(normalUpper(z)).toBe(normalCdf(-z))
      expect(normalCdf(z) + normalUpper(z)).toBeCloseTo(1, 14)
      if (z < 5) expect(normalQuantile(normalCdf(z))).toBeCloseTo(z, 8)
    }))
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 13)
    expect(() => normalQuantile(0)).toThrow(RangeError)
    expect(() => normalQuantile(1)).toThrow(RangeError)
  })
})
