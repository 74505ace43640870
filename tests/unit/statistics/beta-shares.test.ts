import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { betaShares } from '#shared/statistics/beta-shares'

describe('incomplete beta function', () => {
  it('is the power of x for b = 1', () => {
    expect(betaShares(3, 1, 0.2, 0.8).lower).toBeCloseTo(0.008, 15)
    expect(betaShares(3, 1, 0.2, 0.8).upper).toBeCloseTo(0.992, 15)
  })

  it('is symmetric and makes 1 together', () => {
    const shape = fc.double({ min: 0.2, max: 2000, noNaN: true })
    fc.assert(fc.property(shape, shape, fc.double({ min: 0, max: 1, noNaN: true }), (a, b, x) => {
      const here = betaShares(a, b, x, 1 - x)
      const turned = betaShares(b, a, 1 - x, x)
      expect(here.lower + here.upper).toBeCloseTo(1, 13)
      expect(turned.upper).toBeCloseTo(here.lower, 11)
    }))
  })

  it('keeps a small tail of large shapes', () => {
    // 40-digit arithmetic: 7.311715925943811767e-7.
    expect(betaShares(500, 49501, 0.008, 0.992).lower / 7.311715925943811767e-7).toBeCloseTo(1, 11)
  })

  it('refuses what is outside', () => {
    expect(() => betaShares(0, 1, 0.5, 0.5)).toThrow(RangeError)
    expect(() => betaShares(1, 1, 1.5, -0.5)).toThrow(RangeError)
  })
})
