import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { mannKendall, shareTrend, theilSen, trend } from '#shared/statistics/trend'

const values = fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 3, maxLength: 25 })

describe('Mann-Kendall', () => {
  it('turns with the time and ignores any rising change of scale', () => {
    fc.assert(fc.property(values, (list) => {
      const plain = mannKendall(list)
      const back = mannKendall([...list].reverse())
      expect(back.s + plain.s).toBe(0)
      expect(back.p).toBeCloseTo(plain.p, 14)
      expect(mannKendall(list.map(x => x ** 3 + 5)).z).toBe(plain.z)
    }))
  })

  it('gives z 0 and p 1 when all are equal or there is nothing to compare', () => {
    for (const list of [[], [4], [4, 4, 4]]) expect(mannKendall(list)).toMatchObject({ s: 0, z: 0, p: 1 })
  })
})

describe('Theil-Sen', () => {
  it('follows a line, a shift and a scale', () => {
    fc.assert(fc.property(values, fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 8 }), (list, tilt, scale) => {
      const x = list.map((_, i) => i)
      const plain = theilSen(x, list, 0.95)
      const moved = theilSen(x, list.map((y, i) => scale * y + tilt * i + 3), 0.95)
      expect(moved.slope!).toBeCloseTo(scale * plain.slope! + tilt, 10)
      expect(plain.interval.lower!).toBeLessThanOrEqual(plain.slope!)
      expect(plain.interval.upper!).toBeGreaterThanOrEqual(plain.slope!)
    }))
  })

  it('is not moved by one wild value', () => {
    const x = [0, 1, 2, 3, 4, 5, 6, 7, 8]
    expect(theilSen(x, [0, 2, 4, 6, 1e6, 10, 12, 14, 16], 0.95).slope).toBe(2)
  })

  it('leaves out pairs at one time, and refuses when there is only one time', () => {
    expect(theilSen([1, 1, 2], [0, 5, 5], 0.95).slope).toBe(2.5)
    expect(theilSen([1, 1], [0, 5], 0.95)).toMatchObject({ slope: null, intercept: null, reason: expect.stringContaining('different times') })
    expect(theilSen([2, 1], [5, 5], 0.95).slope).toBe(0)
  })
})

describe('trend', () => {
  const months = Array.from({ length: 12 }, (_, i) => i)

  it('finds a rise, a fall, nothing, and too little', () => {
    const noise = [0, 3, 1, 4, 2, 5, 0, 3, 1, 4, 2, 5]
    expect(trend(months, months.map((m, i) => 2 * m + noise[i]!), 0.95).found).toBe('rising')
    expect(trend(months, months.map((m, i) => -2 * m + noise[i]!), 0.95).found).toBe('falling')
    expect(trend(months, [5, 1, 4, 2, 5, 1, 4, 2, 5, 1, 4, 2], 0.95).found).toBe('no trend shown')
    expect(trend([0, 1, 2], [1, 2, 3], 0.95).found).toBe('not enough data to tell')
  })

  it('sorts by time before it judges', () => {
    const turned = [...months].reverse()
    expect(trend(turned, turned.map(m => m * m), 0.95).found).toBe('rising')
  })

  it('warns of values that go together and of equal times', () => {
    expect(trend(months, [1, 1, 1, 1, 1, 1, 9, 9, 9, 9, 9, 9], 0.95).cautions[0]).toContain('go together')
    expect(trend([0, 0, 1, 2, 3, 4, 5, 6], [5, 1, 4, 2, 5, 1, 4, 2], 0.95).cautions.join()).toContain('one time')
  })

  it('refuses what is not a number', () => {
    expect(() => mannKendall([1, NaN])).toThrow('values[1]')
    expect(() => theilSen([1], [1, 2], 0.95)).toThrow('same length')
    expect(() => theilSen([1, 2], [1, 2], 1)).toThrow('confidence')
  })
})

describe('trend of a share', () => {
  it('is that of two proportions when there are two groups with any values', () => {
    const found = shareTrend([5, 0, 15], [50, 0, 50], 0.95)
    expect(found.reason).toContain('three groups')
    // Pooled two-proportion z for 5/50 and 10/50 and 15/50 with scores 0, 1, 2: slope 10, spread 0.2·0.8·100.
    expect(shareTrend([5, 10, 15], [50, 50, 50], 0.95).z).toBeCloseTo(10 / Math.sqrt(0.16 * 100), 12)
  })

  it('says which way, and when it cannot', () => {
    expect(shareTrend([2, 4, 8, 16], [50, 50, 50, 50], 0.95).found).toBe('rising')
    expect(shareTrend([16, 8, 4, 2], [50, 50, 50, 50], 0.95).found).toBe('falling')
    expect(shareTrend([8, 8, 8, 8], [50, 50, 50, 50], 0.95)).toMatchObject({ found: 'no trend shown', z: 0 })
    expect(shareTrend([0, 0, 0], [5, 5, 5], 0.95)).toMatchObject({ z: null, found: 'not enough data to tell', reason: 'none in any group' })
    expect(shareTrend([0, 1, 2], [5, 5, 5], 0.95).found).toBe('not enough data to tell')
    expect(() => shareTrend([6, 1, 1], [5, 5, 5], 0.95)).toThrow('x[0]')
  })
})
