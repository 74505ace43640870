import { describe, expect, it } from 'vitest'
import { biasOf, biasOverRuns, driftOf } from '#shared/statistics/bias'

describe('bias', () => {
  it('is found where its interval leaves out 0, and set beside the reference', () => {
    const high = biasOf([0.4, 0.5, 0.6, 0.5, 0.45, 0.55], 0.95, 0.3)
    expect(high).toMatchObject({ found: 'bias', withinReference: true })
    expect(high.interval.lower!).toBeGreaterThan(0)
    expect(biasOf([0.4, 0.5, 0.6], 0.95, 0.1).withinReference).toBe(false)
    expect(biasOf([-0.1, 0.1, 0.05, -0.05], 0.95)).toMatchObject({ found: 'no bias shown', withinReference: null })
  })

  it('cannot be told from one reading or from equal ones', () => {
    expect(biasOf([0.5], 0.95)).toMatchObject({ bias: 0.5, p: null, found: 'not enough data to tell' })
    expect(biasOf([], 0.95)).toMatchObject({ bias: null, found: 'not enough data to tell' })
    expect(biasOf([0.5, 0.5], 0.95)).toMatchObject({ t: null, found: 'not enough data to tell', reason: expect.stringContaining('resolution') })
  })

  it('is drift when its sign turns between runs', () => {
    const up = [1, 1.1, 0.9, 1.05]
    expect(biasOverRuns([up, up.map(x => -x)], 0.95).signTurns).toBe(true)
    expect(biasOverRuns([up, up], 0.95).signTurns).toBe(false)
    expect(biasOverRuns([up, [-0.1, 0.1, -0.2, 0.15]], 0.95).signTurns).toBe(false)
  })

  it('refuses what is not a number', () => {
    expect(() => biasOf([1, NaN], 0.95)).toThrow('differences[1]')
    expect(() => biasOf([1, 2], 0.95, -1)).toThrow('referenceUncertainty')
  })
})

describe('drift', () => {
  it('is the slope over time with its interval', () => {
    const found = driftOf([0, 1, 2, 3, 4], [10, 10.11, 10.19, 10.31, 10.4], 0.95)
    expect(found.found).toBe('drift')
    expect(found.slope).toBeCloseTo(0.1, 12)
    expect((found.interval.lower! + found.interval.upper!) / 2).toBeCloseTo(0.1, 12)
    expect(found.interval.lower!).toBeGreaterThan(0.09)
    expect(found.interval.upper!).toBeGreaterThan(found.slope!)
    expect(driftOf([0, 1, 2, 3, 4], [10, 10.2, 9.9, 10.1, 10], 0.95).found).toBe('no drift shown')
  })

  it('cannot be told from too little', () => {
    expect(driftOf([0, 1], [1, 2], 0.95)).toMatchObject({ slope: 1, p: null, found: 'not enough data to tell' })
    expect(driftOf([1, 1, 1], [1, 2, 3], 0.95)).toMatchObject({ slope: null, reason: 'all x are equal' })
    expect(() => driftOf([1], [1, 2], 0.95)).toThrow('same length')
  })
})
