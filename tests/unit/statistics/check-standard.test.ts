import { describe, expect, it } from 'vitest'
import { tQuantile } from '#shared/statistics/distributions'
import { checkStandardLimits, rangeControl } from '#shared/statistics/check-standard'

describe('check standard', () => {
  it('has provisional limits below fifteen results', () => {
    const values = Array.from({ length: 14 }, (_, i) => i % 3)
    const history = { values, shortTermStandardDeviations: values.map(() => 0.5), repeats: 4 }
    expect(checkStandardLimits(history, 0.05)).toMatchObject({ provisional: true, level1Df: 42, level2Df: 13 })
    const longer = { values: [...values, 1], shortTermStandardDeviations: [...history.shortTermStandardDeviations, 0.5], repeats: 4 }
    expect(checkStandardLimits(longer, 0.05)).toMatchObject({ provisional: false, reason: null })
  })

  it('has none from one day', () => {
    expect(checkStandardLimits({ values: [5], shortTermStandardDeviations: [1], repeats: 2 }, 0.05))
      .toMatchObject({ mean: 5, lower: null, shortTermLimit: null, reason: expect.stringContaining('two days') })
    expect(() => checkStandardLimits({ values: [5], shortTermStandardDeviations: [], repeats: 2 }, 0.05)).toThrow('same length')
    expect(() => checkStandardLimits({ values: [5], shortTermStandardDeviations: [-1], repeats: 2 }, 0.05)).toThrow('shortTermStandardDeviations[0]')
  })
})

describe('control over the range', () => {
  const line = { intercept: 1, slope: 2, residualStandardDeviation: 0.1, df: 20 }

  it('turns readings back by the line and shares alpha among the levels', () => {
    const { limit, points } = rangeControl(line, [{ reference: 3, reading: 7 }, { reference: 3, reading: 7.5 }], 3, 0.05)
    expect(limit).toBeCloseTo(tQuantile(1 - 0.05 / 6, 20) * 0.05, 12)
    expect(points.map(point => [point.deviation, point.beyond])).toEqual([[0, false], [0.25, true]])
  })

  it('refuses a line without slope', () => {
    expect(() => rangeControl({ ...line, slope: 0 }, [], 3, 0.05)).toThrow('slope')
    expect(() => rangeControl(line, [{ reference: NaN, reading: 1 }], 3, 0.05)).toThrow('readings[0].reference')
  })
})
