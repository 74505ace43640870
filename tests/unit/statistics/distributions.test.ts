import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  betaCdf, betaQuantile, chiSquareCdf, chiSquareQuantile, chiSquareUpper, fCdf, fQuantile, fUpper, tCdf, tQuantile, tTwoSided,
} from '#shared/statistics/distributions'

const p = fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true })
const df = fc.double({ min: 0.5, max: 2000, noNaN: true })

/** Agreement of the two tails with a probability, on the smaller one. */
function agrees(lower: number, upper: number, wanted: number): void {
  const [tail, target] = wanted <= 0.5 ? [lower, wanted] : [upper, 1 - wanted]
  expect(Math.abs(tail / target - 1)).toBeLessThan(1e-9)
}

describe('distributions', () => {
  it('go from probability to quantile and back', () => {
    fc.assert(fc.property(p, df, df, (at, a, b) => {
      const chi = chiSquareQuantile(at, a)
      agrees(chiSquareCdf(chi, a), chiSquareUpper(chi, a), at)
      const f = fQuantile(at, a, b)
      agrees(fCdf(f, a, b), fUpper(f, a, b), at)
      const t = tQuantile(at, a)
      agrees(tCdf(t, a), tCdf(-t, a), at)
    }), { numRuns: 60 })
    // From 1 up: below it a quantile next to 1 has too few digits left for the way back.
    fc.assert(fc.property(p, fc.double({ min: 1, max: 500, noNaN: true }), fc.double({ min: 1, max: 500, noNaN: true }), (at, a, b) => {
      expect(betaCdf(betaQuantile(at, a, b), a, b)).toBeCloseTo(at, 9)
    }), { numRuns: 60 })
  })

  it('rise', () => {
    fc.assert(fc.property(p, p, df, (one, two, a) => {
      fc.pre(Math.abs(one - two) > 1e-9)
      const [low, high] = [Math.min(one, two), Math.max(one, two)]
      expect(tQuantile(low, a)).toBeLessThan(tQuantile(high, a))
      expect(chiSquareQuantile(low, a)).toBeLessThan(chiSquareQuantile(high, a))
    }), { numRuns: 60 })
  })

  it('are right near the centre of chi-square at thousands of degrees of freedom', () => {
    // 40-digit arithmetic.
    expect(chiSquareCdf(5001.3, 5000)).toBeCloseTo(0.5078448777842904, 12)
    expect(chiSquareCdf(2050, 2000)).toBeCloseTo(0.7865754838618071, 12)
    expect(chiSquareQuantile(0.975, 5000) / 5197.883771923797 - 1).toBeCloseTo(0, 12)
  })

  it('keep the digits of a tiny tail', () => {
    expect(fUpper(112.23997927530696, 9, 22) / 2.7763941068537766e-16).toBeCloseTo(1, 9)
    expect(tTwoSided(40, 7) / 1.5902179984850364e-9).toBeCloseTo(1, 9)
  })

  it('know closed forms: t with 1 and 2, chi-square with 2, F by t', () => {
    for (const at of [0.001, 0.2, 0.4, 0.7, 0.999]) {
      expect(tQuantile(at, 1) / Math.tan(Math.PI * (at - 0.5))).toBeCloseTo(1, 12)
      expect(tQuantile(at, 2) / ((2 * at - 1) / Math.sqrt(2 * at * (1 - at)))).toBeCloseTo(1, 12)
      expect(chiSquareQuantile(at, 2) / (-2 * Math.log1p(-at))).toBeCloseTo(1, 12)
      expect(fQuantile(at, 1, 9) / tQuantile((1 + at) / 2, 9) ** 2).toBeCloseTo(1, 12)
    }
    expect(tQuantile(0.5, 3)).toBe(0)
  })

  it('keep the digits of a t quantile next to the centre', () => {
    // Density of t with 4 at 0 is 3/8 and falls as 1 - 5/8 t²: t = d (1 + 5/24 d²) with d = 0.0001 / (3/8).
    const d = 0.0001 / 0.375
    expect(-tQuantile(0.4999, 4) / (d * (1 + 5 / 24 * d * d))).toBeCloseTo(1, 11)
  })

  it('hold their edges and refuse what is outside', () => {
    expect(chiSquareCdf(0, 3)).toBe(0)
    expect(fUpper(0, 3, 4)).toBe(1)
    expect(betaCdf(1, 2, 3)).toBe(1)
    expect(tCdf(0, 5)).toBe(0.5)
    for (const call of [
      () => tQuantile(0, 5), () => tQuantile(1, 5), () => tQuantile(0.5, 0), () => tCdf(NaN, 5), () => tCdf(1, Infinity),
      () => chiSquareQuantile(0.5, -1), () => chiSquareCdf(-1, 2), () => fQuantile(0.5, 0, 1), () => fUpper(NaN, 1, 1),
      () => betaQuantile(0.5, 0, 1), () => betaCdf(1.2, 1, 1),
    ]) expect(call).toThrow(RangeError)
  })
})
