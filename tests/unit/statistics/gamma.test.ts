import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { devianceTerm, incompleteGamma, logGamma, stirlingError } from '#shared/statistics/gamma'

describe('gamma functions', () => {
  it('know factorials and halves', () => {
    expect(logGamma(1)).toBeCloseTo(0, 14)
    expect(logGamma(11)).toBeCloseTo(Math.log(3628800), 13)
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 14)
    expect(stirlingError(1)).toBeCloseTo(1 - Math.log(2 * Math.PI) / 2, 14)
  })

  it('step by the recurrence', () => {
    fc.assert(fc.property(fc.double({ min: 1e-3, max: 1e5, noNaN: true }), (x) => {
      expect(Math.abs(logGamma(x + 1) - logGamma(x) - Math.log(x))).toBeLessThan(1e-14 * (1 + Math.abs(logGamma(x))) * 4)
    }))
  })

  it('keep the deviance without cancellation', () => {
    expect(devianceTerm(1e6, 1e6 + 1)).toBeCloseTo(5e-7 * (1 - 2 / 3e6), 16)
    expect(devianceTerm(3, 3)).toBe(0)
  })

  it('are the exponential distribution for a = 1', () => {
    for (const x of [0.01, 0.5, 2, 10, 50]) {
      expect(incompleteGamma(1, x).lower / -Math.expm1(-x)).toBeCloseTo(1, 13)
      expect(incompleteGamma(1, x).upper / Math.exp(-x)).toBeCloseTo(1, 13)
    }
  })

  it('make 1 together, and rise with x', () => {
    fc.assert(fc.property(fc.double({ min: 0.1, max: 5000, noNaN: true }), fc.double({ min: 0.2, max: 2, noNaN: true }), (a, share) => {
      const here = incompleteGamma(a, a * share)
      expect(here.lower + here.upper).toBeCloseTo(1, 14)
      expect(incompleteGamma(a, a * share * 1.01).lower).toBeGreaterThanOrEqual(here.lower - 1e-14)
    }))
  })

  it('refuse what is outside', () => {
    expect(() => logGamma(0)).toThrow(RangeError)
    expect(() => incompleteGamma(1, -1)).toThrow(RangeError)
    expect(() => incompleteGamma(NaN, 1)).toThrow(RangeError)
  })
})
