import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cusum } from '#shared/statistics/cusum'

const settings = { target: 10, k: 0.5, h: 4 }

describe('cumulative sum', () => {
  it('signals above h, not on it', () => {
    expect(cusum([14.5], settings)).toMatchObject({ firstHigh: null })
    expect(cusum([14.5, 10.6], settings)).toMatchObject({ firstHigh: 1, firstLow: null })
    expect(cusum([5.4], settings)).toMatchObject({ firstLow: 0 })
  })

  it('holds over a missing value', () => {
    const { points } = cusum([12, null, 12], settings)
    expect(points.map(point => point.high)).toEqual([1.5, 1.5, 3])
    expect(points[1]!.signal).toBeNull()
  })

  it('begins anew after a signal when told so, also with a head start', () => {
    const { points } = cusum([20, 11, 11], { ...settings, resetAfterSignal: true, start: 2 })
    expect(points.map(point => point.high)).toEqual([11.5, 2.5, 3])
    expect(points[0]!.signal).toBe('high')
    expect(cusum([20, 11], settings).points[1]!.high).toBe(10)
  })

  it('mirrors', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 0, max: 20 })), (list) => {
      const there = cusum(list, settings)
      const mirrored = cusum(list.map(x => 20 - x), settings)
      expect(mirrored.points.map(point => point.low)).toEqual(there.points.map(point => point.high))
      expect(mirrored.firstLow).toBe(there.firstHigh)
    }))
  })

  it('refuses a wrong setting', () => {
    expect(() => cusum([1], { ...settings, h: 0 })).toThrow('h must')
    expect(() => cusum([1], { ...settings, k: -1 })).toThrow('k must')
    expect(() => cusum([1], { ...settings, start: 5 })).toThrow('start')
    expect(() => cusum([Infinity], settings)).toThrow('series[0]')
  })
})
