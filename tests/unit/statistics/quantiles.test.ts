import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { median, quantile, quantiles, QUANTILE_TYPE_NAMES, type QuantileType } from '#shared/statistics/quantiles'

const value = fc.double({ min: -1e6, max: 1e6, noNaN: true })
const values = fc.array(value, { minLength: 1, maxLength: 30 })
const type = fc.constantFrom<QuantileType>(6, 7, 8)
const p = fc.double({ min: 0, max: 1, noNaN: true })

describe('quantiles', () => {
  it('differ by type, and have a name each', () => {
    const data = [1, 2, 3, 4]
    expect(quantile(data, 0.25, 6)).toBe(1.25)
    expect(quantile(data, 0.25, 7)).toBe(1.75)
    expect(quantile(data, 0.25, 8)).toBeCloseTo(17 / 12, 14)
    expect(new Set(Object.values(QUANTILE_TYPE_NAMES)).size).toBe(3)
  })

  it('hold at both ends, and give the value where there is only one', () => {
    for (const kind of [6, 7, 8] as const) {
      expect(quantiles([3, 1, 2], [0, 1], kind)).toEqual([1, 3])
      expect(quantile([5], 0.3, kind)).toBe(5)
      expect(quantile([], 0.3, kind)).toBeNull()
    }
    expect(median([1, 2])).toBe(1.5)
    expect(median([])).toBeNull()
  })

  it('refuse a probability outside 0 to 1 and what is not a number', () => {
    expect(() => quantile([1], 1.1)).toThrow(RangeError)
    expect(() => quantile([1], NaN)).toThrow(RangeError)
    expect(() => quantile([NaN], 0.5)).toThrow('values[0]')
  })

  it('rise with p and stay between the extremes', () => {
    fc.assert(fc.property(values, p, p, type, (list, a, b, kind) => {
      const [low, high] = quantiles(list, [Math.min(a, b), Math.max(a, b)], kind) as [number, number]
      expect(low).toBeLessThanOrEqual(high)
      expect(low).toBeGreaterThanOrEqual(Math.min(...list))
      expect(high).toBeLessThanOrEqual(Math.max(...list))
    }))
  })

  it('do not depend on the order of the values nor change it', () => {
    fc.assert(fc.property(values, p, type, (list, at, kind) => {
      const before = [...list]
      expect(quantile([...list].reverse(), at, kind)).toBe(quantile(list, at, kind))
      expect(list).toEqual(before)
    }))
  })

  it('mirror: the p quantile of the negatives is the negative of the 1 - p quantile', () => {
    fc.assert(fc.property(values, fc.integer({ min: 0, max: 16 }), type, (list, sixteenths, kind) => {
      const at = sixteenths / 16
      expect(quantile(list.map(x => -x), at, kind)).toBeCloseTo(-quantile(list, 1 - at, kind)!, 6)
    }))
  })
})
