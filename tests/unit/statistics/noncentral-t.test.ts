import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { tCdf } from '#shared/statistics/distributions'
import { noncentralityFor, noncentralTCdf, noncentralTQuantile, noncentralTUpper } from '#shared/statistics/noncentral-t'

const df = fc.integer({ min: 1, max: 300 })
const delta = fc.double({ min: -20, max: 40, noNaN: true })

describe('noncentral t', () => {
  it('agrees with Boost as scipy 1.17 carries it', () => {
    expect(noncentralTCdf(3, 4, 1.5)).toBeCloseTo(0.8207589750585633, 12)
    expect(noncentralTQuantile(0.95, 9, 4)).toBeCloseTo(7.366521616413523, 9)
  })

  it('is the central one at 0', () => {
    fc.assert(fc.property(df, fc.double({ min: -8, max: 8, noNaN: true }), (n, t) => {
      expect(noncentralTCdf(t, n, 0)).toBeCloseTo(tCdf(t, n), 11)
    }), { numRuns: 40 })
  })

  it('has tails that make 1 and mirror', () => {
    fc.assert(fc.property(df, delta, fc.double({ min: -30, max: 60, noNaN: true }), (n, d, t) => {
      expect(noncentralTCdf(t, n, d) + noncentralTUpper(t, n, d)).toBeCloseTo(1, 12)
      expect(noncentralTCdf(-t, n, -d)).toBeCloseTo(noncentralTUpper(t, n, d), 12)
    }), { numRuns: 40 })
  })

  it('goes back and forth, in t and in the noncentrality', () => {
    fc.assert(fc.property(df, delta, fc.double({ min: 0.001, max: 0.999, noNaN: true }), (n, d, p) => {
      const t = noncentralTQuantile(p, n, d)
      expect(noncentralTCdf(t, n, d)).toBeCloseTo(p, 10)
      expect(noncentralTCdf(t, n, noncentralityFor(p, t, n))).toBeCloseTo(p, 10)
    }), { numRuns: 15 })
  })

  it('refuses what is outside', () => {
    expect(() => noncentralTCdf(NaN, 5, 0)).toThrow('t must')
    expect(() => noncentralTCdf(1, 0.5, 0)).toThrow('df')
    expect(() => noncentralTQuantile(0, 5, 0)).toThrow(RangeError)
    expect(() => noncentralTCdf(1, 5, Infinity)).toThrow('delta')
  })
})
