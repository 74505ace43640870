import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { ewmaChart } from '#shared/statistics/ewma'

const settings = { lambda: 0.2, target: 10, sigma: 1, width: 2.962 }

describe('moving average with weights', () => {
  it('holds over a missing value, which does not count', () => {
    const { points } = ewmaChart([12, null, 12], settings)
    expect(points.map(point => point.ewma)).toEqual([expect.closeTo(10.4, 12), expect.closeTo(10.4, 12), expect.closeTo(10.72, 12)])
    expect(points[1]).toMatchObject({ value: null, beyond: false, halfWidth: points[0]!.halfWidth })
    expect(points[2]!.halfWidth).toBeGreaterThan(points[0]!.halfWidth)
  })

  it('is the plain chart of individuals at lambda 1', () => {
    const { points } = ewmaChart([13.1, 12.9, 7], { ...settings, lambda: 1, width: 3 })
    expect(points.map(point => point.beyond)).toEqual([true, false, false])
    expect(points.map(point => point.halfWidth)).toEqual([3, 3, 3])
  })

  it('widens towards its settled limits', () => {
    const { points, asymptoticUpper } = ewmaChart(Array.from({ length: 60 }, () => 10), settings)
    expect(points[0]!.upper!).toBeLessThan(points[1]!.upper!)
    expect(points.at(-1)!.upper).toBeCloseTo(asymptoticUpper, 9)
  })

  it('stays between target and extremes', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 0, max: 20 }), { minLength: 1 }), fc.double({ min: 0.01, max: 1, noNaN: true }), (list, lambda) => {
      for (const { ewma } of ewmaChart(list, { ...settings, lambda }).points) {
        expect(ewma).toBeGreaterThanOrEqual(Math.min(10, ...list) - 1e-9)
        expect(ewma).toBeLessThanOrEqual(Math.max(10, ...list) + 1e-9)
      }
    }))
  })

  it('refuses a wrong setting', () => {
    expect(() => ewmaChart([1], { ...settings, lambda: 0 })).toThrow('lambda')
    expect(() => ewmaChart([1], { ...settings, sigma: 0 })).toThrow('sigma')
    expect(() => ewmaChart([NaN], settings)).toThrow('series[0]')
  })
})
