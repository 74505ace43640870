import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { countControlChart, laneyShareControlChart, shareControlChart } from '#shared/statistics/attribute-charts'

const groups = fc.array(fc.integer({ min: 1, max: 300 }).chain(n => fc.record({ x: fc.integer({ min: 0, max: n }), n: fc.constant(n) })), { minLength: 3, maxLength: 12 })

describe('charts of shares', () => {
  it('keep limits between 0 and 1 around the centre, wider for smaller groups', () => {
    fc.assert(fc.property(groups, (list) => {
      const chart = shareControlChart(list.map(g => g.x), list.map(g => g.n))
      fc.pre(chart.reason === null)
      chart.points.forEach((point, i) => {
        expect(point.lower!).toBeGreaterThanOrEqual(0)
        expect(point.upper!).toBeLessThanOrEqual(1)
        expect(point.lower!).toBeLessThanOrEqual(chart.centre!)
        chart.points.forEach((other, j) => {
          if (list[i]!.n < list[j]!.n) expect(point.upper!).toBeGreaterThanOrEqual(other.upper! - 1e-12)
        })
      })
    }))
  })

  it('give no chart where none or all have the property, or nothing was counted', () => {
    expect(shareControlChart([0, 0], [10, 20])).toMatchObject({ centre: 0, reason: 'none in any group: no chart' })
    expect(shareControlChart([10, 20], [10, 20])).toMatchObject({ centre: 1, sigmaZ: null })
    expect(shareControlChart([0], [0])).toMatchObject({ centre: null, reason: 'no values' })
    expect(shareControlChart([5, 0, 5], [50, 0, 50]).points[1]).toEqual({ value: null, lower: null, upper: null, beyond: false })
  })

  it('say when the limits mean little', () => {
    expect(shareControlChart([1, 2, 1], [20, 20, 20]).cautions.join()).toContain('mean little')
    expect(shareControlChart([10, 20, 10], [100, 100, 100]).cautions).toEqual([])
  })

  it('show when the factor narrows the limits', () => {
    const calm = laneyShareControlChart([100, 101, 100, 101], [1000, 1000, 1000, 1000])
    expect(calm.sigmaZ!).toBeLessThan(1)
    expect(calm.cautions.join()).toContain('narrower')
    expect(laneyShareControlChart([5], [50]).reason).toContain('two groups')
  })

  it('depend on the order in time only with the factor', () => {
    const one = laneyShareControlChart([10, 20, 30, 40], [100, 100, 100, 100])
    const other = laneyShareControlChart([10, 40, 20, 30], [100, 100, 100, 100])
    expect(other.sigmaZ!).toBeGreaterThan(one.sigmaZ!)
    expect(other.centre).toBe(one.centre)
  })

  it('refuse counts that do not fit', () => {
    expect(() => shareControlChart([5], [4])).toThrow('counts[0]')
    expect(() => shareControlChart([1, 2], [4])).toThrow('same length')
    expect(() => laneyShareControlChart([1], [4], NaN)).toThrow('d2')
  })
})

describe('chart of counts', () => {
  it('does not call a point on the limit beyond', () => {
    // Centre 4, limits 0 and 10.
    const chart = countControlChart([10, 4, 4, 2, 4, 0])
    expect(chart).toMatchObject({ centre: 4, upper: 10, lower: 0 })
    expect(chart.points.some(point => point.beyond)).toBe(false)
  })

  it('is refused with a reason', () => {
    expect(countControlChart([0, 0])).toMatchObject({ centre: 0, upper: null, reason: 'none counted: no chart' })
    expect(countControlChart([])).toMatchObject({ centre: null, reason: 'no values' })
    expect(() => countControlChart([1.5])).toThrow('counts[0]')
  })
})
