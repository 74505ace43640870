import { describe, expect, it } from 'vitest'
import { c4 } from '#shared/statistics/control-constants'
import { xbarRangeChart, xbarStandardDeviationChart } from '#shared/statistics/subgroup-chart'

describe('charts of subgroups', () => {
  it('set limits per subgroup from the pooled spread where sizes differ', () => {
    const chart = xbarStandardDeviationChart([[1, 3], [2, 4, 6], [3]])
    // Sums of squares 2 and 8 with 1 and 2 degrees of freedom.
    const pooled = Math.sqrt(10 / 3)
    expect(chart.spread).toBe('pooled standard deviation')
    expect(chart.sigma).toBeCloseTo(pooled, 14)
    expect(chart.centre).toBeCloseTo(19 / 6, 14)
    expect(chart.means.map(point => point.upper! - chart.centre!)).toEqual([2, 3, 1].map(n => expect.closeTo(3 * pooled / Math.sqrt(n), 12)))
    expect(chart.spreads[1]!.upper).toBeCloseTo(pooled * (c4(3) + 3 * Math.sqrt(1 - c4(3) ** 2)), 12)
    expect(chart.spreads[2]).toMatchObject({ value: null, beyond: false })
  })

  it('refuse ranges for unequal or large subgroups, in words', () => {
    expect(xbarRangeChart([[1, 2], [1, 2, 3]]).reason).toContain('unequal')
    expect(xbarRangeChart([Array(11).fill(1), Array(11).fill(2)]).reason).toContain('more than ten')
    expect(xbarRangeChart([[1], [2]]).reason).toContain('two values')
    expect(xbarRangeChart([[1, 2]]).reason).toContain('two subgroups')
    expect(xbarStandardDeviationChart([[1], [2]]).reason).toContain('two values')
    expect(xbarStandardDeviationChart([[], [2, 3]]).reason).toContain('empty')
  })

  it('say when there is no spread', () => {
    expect(xbarRangeChart([[1, 1], [2, 2]])).toMatchObject({ meanSpread: 0, reason: 'no spread within the subgroups' })
  })

  it('mark a subgroup whose mean or spread is beyond', () => {
    const calm = Array.from({ length: 12 }, (_, i) => [10 + (i % 2), 11, 10, 11, 10 + ((i + 1) % 2)])
    const chart = xbarStandardDeviationChart([...calm, [20, 21, 20, 21, 20], [2, 20, 10, 5, 15]])
    expect(chart.means.map(point => point.beyond).lastIndexOf(true)).toBe(12)
    expect(chart.spreads.map(point => point.beyond).indexOf(true)).toBe(13)
  })

  it('refuse what is not a number', () => {
    expect(() => xbarRangeChart([[1, NaN], [1, 2]])).toThrow('subgroups[0][1]')
  })
})
