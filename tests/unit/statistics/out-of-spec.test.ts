import { describe, expect, it } from 'vitest'
import { isOutside, outOfSpecShare, requireLimits } from '#shared/statistics/out-of-spec'

describe('share out of specification', () => {
  it('takes a value on the limit as inside', () => {
    expect(isOutside(98, { lower: 98 })).toBe(false)
    expect(isOutside(97.99, { lower: 98 })).toBe(true)
    expect(isOutside(2.01, { upper: 2 })).toBe(true)
  })

  it('counts vehicles, not readings', () => {
    const values = [97, 97.5, 99, 99, 99]
    const vehicles = ['a', 'a', 'a', 'b', 'c']
    expect(outOfSpecShare(values, { lower: 98 }, 0.95)).toMatchObject({ outside: 2, n: 5, share: 0.4 })
    const byVehicle = outOfSpecShare(values, { lower: 98 }, 0.95, vehicles)
    expect(byVehicle).toMatchObject({ outside: 1, n: 3 })
    expect(byVehicle.interval.upper! - byVehicle.interval.lower!)
      .toBeGreaterThan(0.6)
  })

  it('has no share of nothing', () => {
    expect(outOfSpecShare([], { upper: 1 }, 0.95)).toMatchObject({ n: 0, share: null, interval: { reason: 'no values' } })
  })

  it('refuses wrong limits', () => {
    expect(() => requireLimits({})).toThrow('limits')
    expect(() => requireLimits({ lower: 2, upper: 1 })).toThrow('limits.lower')
    expect(() => requireLimits({ lower: 2, upper: 2 })).toThrow('limits.lower')
    expect(() => requireLimits({ upper: NaN })).toThrow('limits.upper')
    expect(() => outOfSpecShare([1], { upper: 2 }, 0.95, [])).toThrow('same length')
  })
})
