import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { individualsChart, movingRanges } from '#shared/statistics/individuals-chart'

describe('individuals chart', () => {
  it('never joins neighbours over a missing value or a change of conditions', () => {
    expect(movingRanges([1, 3, null, 10, 11])).toEqual([null, 2, null, null, 1])
    expect(movingRanges([1, 3, 10, 11], [2])).toEqual([null, 2, null, 1])
    const chart = individualsChart([1, 3, null, 10, 11], { breaks: [] })
    expect(chart.meanMovingRange).toBe(1.5)
    expect(chart.points[2]).toMatchObject({ value: null, beyond: false })
  })

  it('marks what is strictly beyond', () => {
    const data = [...Array.from({ length: 20 }, (_, i) => i % 2), 30]
    const chart = individualsChart(data)
    expect(chart.points.filter(point => point.beyond).map(point => point.value)).toEqual([30])
    expect(chart.movingRanges.at(-1)!.beyond).toBe(true)
    expect(chart.movingRangeUpper! / chart.meanMovingRange!).toBeCloseTo(3.2665, 4)
  })

  it('takes the exact d2 unless another is given', () => {
    const exact = individualsChart([1, 2, 1, 2])
    expect(exact.sigma).toBeCloseTo(Math.sqrt(Math.PI) / 2, 14)
    expect(individualsChart([1, 2, 1, 2], { d2: 1.128 }).sigma).toBeCloseTo(1 / 1.128, 14)
  })

  it('warns of few values and of a coarse display', () => {
    expect(individualsChart([1, 2, 1, 2]).cautions.join()).toContain('provisional')
    const coarse = Array.from({ length: 30 }, (_, i) => (i % 10 === 0 ? 1 : 0))
    expect(individualsChart(coarse).cautions.join()).toContain('coarse')
    expect(individualsChart(Array.from({ length: 30 }, (_, i) => i % 2), { resolution: 1 }).cautions.join()).toContain('coarse')
    expect(individualsChart(Array.from({ length: 30 }, (_, i) => i % 2), { resolution: 0.1 }).cautions).toEqual([])
  })

  it('says why there are no limits', () => {
    expect(individualsChart([])).toMatchObject({ centre: null, sigma: null, reason: 'needs two neighbouring values' })
    expect(individualsChart([1, null, 2])).toMatchObject({ centre: 1.5, lower: null })
    expect(individualsChart([4, 4, 4])).toMatchObject({ sigma: 0, reason: expect.stringContaining('no spread') })
  })

  it('follows shift and scale', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: -99, max: 99 }), { minLength: 2, maxLength: 20 }), fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 9 }), (list, shift, scale) => {
      const plain = individualsChart(list)
      const moved = individualsChart(list.map(x => scale * x + shift))
      expect(moved.upper!).toBeCloseTo(scale * plain.upper! + shift, 9)
      expect(moved.lower!).toBeCloseTo(scale * plain.lower! + shift, 9)
    }))
  })

  it('refuses what is not a number', () => {
    expect(() => individualsChart([1, NaN])).toThrow('series[1]')
    expect(() => individualsChart([1, 2], { d2: 0 })).toThrow('d2')
  })
})
