import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { normalQuantile } from '#shared/statistics/normal'
import { andersonDarling, normalProbabilityPlot } from '#shared/statistics/normality'

const scores = Array.from({ length: 40 }, (_, i) => normalQuantile((i + 0.5) / 40))

describe('Anderson-Darling', () => {
  it('leaves normal scores alone and doubts a skewed batch', () => {
    expect(andersonDarling(scores).p!).toBeGreaterThan(0.9)
    expect(andersonDarling(scores.map(Math.exp)).p!).toBeLessThan(0.001)
  })

  it('does not change with shift, scale and order', () => {
    fc.assert(fc.property(fc.integer({ min: -100, max: 100 }), fc.integer({ min: 1, max: 50 }), (shift, scale) => {
      const plain = andersonDarling(scores.map(Math.exp))
      const moved = andersonDarling(scores.map(x => scale * Math.exp(x) + shift).reverse())
      expect(moved.statistic).toBeCloseTo(plain.statistic!, 9)
    }), { numRuns: 30 })
  })

  it('says that a coarse display makes it fail', () => {
    const coarse = scores.map(x => Math.round(x))
    expect(andersonDarling(coarse).p!).toBeLessThan(0.05)
    expect(andersonDarling(coarse, 1).reason).toContain('coarse')
    expect(andersonDarling(scores, 0.01).reason).toBeNull()
  })

  it('is refused with a reason', () => {
    expect(andersonDarling([1, 2]).reason).toContain('three')
    expect(andersonDarling([2, 2, 2])).toMatchObject({ statistic: null, p: null, reason: 'all values are equal' })
    expect(() => andersonDarling([1, 2, NaN])).toThrow(RangeError)
    expect(() => andersonDarling([1, 2, 3], 0)).toThrow('resolution')
  })

  it('stays a number for a very far value', () => {
    const { statistic, p } = andersonDarling([...scores, 1e9])
    expect(Number.isFinite(statistic)).toBe(true)
    expect(p).toBeGreaterThanOrEqual(0)
  })
})

describe('normal probability plot', () => {
  it('is a straight line for normal scores', () => {
    const expected = normalProbabilityPlot(scores).points.map(point => point.theoretical)
    const { points, correlation, intercept, slope } = normalProbabilityPlot(expected.map(x => 5 + 2 * x))
    expect(points).toHaveLength(40)
    expect(correlation).toBeCloseTo(1, 12)
    expect(intercept).toBeCloseTo(5, 12)
    expect(slope).toBeCloseTo(2, 12)
  })

  it('is sorted and symmetric in its theoretical quantiles', () => {
    const { points } = normalProbabilityPlot([3, 1, 2, 9, 4])
    expect(points.map(point => point.value)).toEqual([1, 2, 3, 4, 9])
    expect(points[0]!.theoretical).toBeCloseTo(-points[4]!.theoretical, 12)
    expect(points[2]!.theoretical).toBeCloseTo(0, 12)
  })

  it('has no line where there is no spread', () => {
    expect(normalProbabilityPlot([])).toEqual({ points: [], correlation: null, intercept: null, slope: null })
    expect(normalProbabilityPlot([4, 4, 4])).toMatchObject({ correlation: null, slope: null })
  })
})
