import { describe, expect, it } from 'vitest'
import { chartPoint, requireSeries } from '#shared/statistics/chart-series'

describe('series of a chart', () => {
  it('keeps what is there and passes over what is missing', () => {
    expect(requireSeries([1, null, 2], 'series')).toEqual([1, 2])
    expect(() => requireSeries([null, NaN], 'readings')).toThrow('readings[1]')
  })

  it('calls beyond only what is strictly outside', () => {
    expect([0.9, 1, 2, 2.1, null].map(value => chartPoint(value, 1, 2).beyond)).toEqual([true, false, false, true, false])
  })
})
