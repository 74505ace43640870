import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { summarise } from '#shared/statistics/describe'
import { censoredFit, censoredQuantile, substitutedMean } from '#shared/statistics/censored'

const observed = fc.array(fc.integer({ min: 1, max: 200 }), { minLength: 4, maxLength: 15 })
const below = fc.array(fc.integer({ min: 1, max: 100 }), { maxLength: 6 })

describe('maximum likelihood with values below detection', () => {
  it('is mean and spread with divisor n when nothing is below', () => {
    fc.assert(fc.property(observed, (list) => {
      fc.pre(new Set(list).size > 1)
      const plain = summarise(list)
      const found = censoredFit({ observed: list, below: [] })
      expect(found.mean!).toBeCloseTo(plain.mean!, 8)
      expect(found.standardDeviation!).toBeCloseTo(Math.sqrt(plain.m2 / plain.n), 8)
    }))
  })

  it('follows shift and scale', () => {
    fc.assert(fc.property(observed, below, fc.integer({ min: -50, max: 50 }), fc.integer({ min: 1, max: 9 }), (list, limits, shift, scale) => {
      const plain = censoredFit({ observed: list, below: limits })
      fc.pre(plain.mean !== null)
      const move = (x: number): number => scale * x + shift
      const moved = censoredFit({ observed: list.map(move), below: limits.map(move) })
      const size = scale * (Math.abs(plain.mean!) + plain.standardDeviation!) + Math.abs(shift)
      expect(Math.abs(moved.mean! - (scale * plain.mean! + shift))).toBeLessThan(1e-6 * size)
      expect(Math.abs(moved.standardDeviation! - scale * plain.standardDeviation!)).toBeLessThan(1e-6 * size)
    }))
  })

  it('lies at the summit: every small step away is less likely', () => {
    const sample = { observed: [0.4, 0.6, 0.5, 1, 0.8, 0.9, 0.7], below: [0.4, 0.4] }
    const { mean, standardDeviation } = censoredFit(sample)
    expect(mean).toBeCloseTo(0.59927972, 7)
    expect(standardDeviation).toBeCloseTo(0.26498318, 7)
  })

  it('takes logarithms on wish, and turns the figures back', () => {
    const values = [1, 2, 4, 8, 16]
    const found = censoredFit({ observed: values, below: [] }, 'logarithm')
    expect(found.logMean).toBeCloseTo(Math.log(4), 12)
    const variance = found.logStandardDeviation! ** 2
    expect(found.mean).toBeCloseTo(4 * Math.exp(variance / 2), 10)
    expect(() => censoredFit({ observed: [0, 1, 2], below: [] }, 'logarithm')).toThrow('observed[0]')
  })

  it('copes with limits far away on either side', () => {
    expect(censoredFit({ observed: [5, 6, 7], below: [100, 100] })).toMatchObject({ below: 2, reason: null })
    expect(Number.isFinite(censoredFit({ observed: [5, 6, 7], below: [-1e6] }).mean)).toBe(true)
  })

  it('gives no mean where there is none', () => {
    expect(censoredFit({ observed: [], below: [0.2, 0.3] })).toMatchObject({ mean: null, standardDeviation: null, allBelow: 0.3 })
    expect(censoredFit({ observed: [1, 2], below: [0.2] })).toMatchObject({ mean: null, allBelow: null, reason: expect.stringContaining('fewer than three') })
    expect(censoredFit({ observed: [1, 2, 3], below: Array.from({ length: 13 }, () => 1) }).reason).toContain('80 %')
    expect(censoredFit({ observed: [5, 5, 5], below: [6] }).reason).toContain('no spread')
    expect(censoredFit({ observed: [], below: [] }).reason).toBe('no values')
    expect(() => censoredFit({ observed: [NaN], below: [] })).toThrow('observed[0]')
  })
})

describe('quantile with values below detection', () => {
  it('needs no model above the largest limit and is "< limit" below it', () => {
    const sample = { observed: [0.5, 1, 2, 3, 4, 5], below: [0.2, 0.8] }
    expect(censoredQuantile(sample, 0.9)).toEqual({ value: expect.closeTo(4.3, 12), lessThan: null, reason: null })
    expect(censoredQuantile(sample, 0.1)).toEqual({ value: null, lessThan: 0.8, reason: null })
    expect(censoredQuantile({ observed: [], below: [] }, 0.5).reason).toBe('no values')
    expect(censoredQuantile({ observed: [1, 2, 3], below: [] }, 0)).toMatchObject({ value: 1 })
  })
})

describe('substitution', () => {
  it('replaces each limit by a named share of it', () => {
    expect(substitutedMean({ observed: [1, 2], below: [0.6] }, 0.5)).toBeCloseTo(1.1, 14)
    expect(substitutedMean({ observed: [], below: [] }, 0.5)).toBeNull()
    expect(() => substitutedMean({ observed: [1], below: [] }, 2)).toThrow('shareOfLimit')
  })
})
