import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { dotPlot, histogram, MOST_BINS } from '#shared/statistics/histogram'

describe('histogram', () => {
  it('counts every value once, in bins of one width without gaps', () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 1, maxLength: 200 }), fc.option(fc.constantFrom(0.1, 0.5, 1), { nil: undefined }), (steps, resolution) => {
      const values = steps.map(step => step * (resolution ?? 0.37))
      const { bins, binWidth } = histogram(values, resolution)
      expect(bins.reduce((sum, bin) => sum + bin.count, 0)).toBe(values.length)
      expect(bins.length).toBeLessThanOrEqual(MOST_BINS + 1)
      bins.forEach((bin, i) => {
        expect(bin.upper - bin.lower).toBeCloseTo(binWidth!, 9)
        if (i > 0) expect(bin.lower).toBeCloseTo(bins[i - 1]!.upper, 9)
      })
      if (resolution !== undefined) expect(binWidth! / resolution).toBeCloseTo(Math.round(binWidth! / resolution), 9)
    }))
  })

  it('takes the width of Freedman and Diaconis, or of Scott where the quartiles coincide', () => {
    // Quartiles 16 and 48 of 0 to 64.
    expect(histogram(Array.from({ length: 65 }, (_, i) => i)).binWidth).toBeCloseTo(64 / Math.cbrt(65), 12)
    const piled = [...Array.from({ length: 25 }, () => 0), 3, 4]
    const sd = Math.sqrt((25 - 49 / 27) / 26)
    expect(histogram(piled).binWidth).toBeCloseTo(3.49 * sd / 3, 12)
  })

  it('reaches half a step over both ends when the step is known', () => {
    const { bins } = histogram([0, 0.5, 1, 1.5, 2, 2, 2.5, 3], 0.5)
    expect(bins[0]!.lower).toBe(-0.25)
    expect(bins.at(-1)!.upper).toBeGreaterThanOrEqual(3.25)
    expect(bins.at(-1)!.lower).toBeLessThan(3.25)
  })

  it('lets no value fall on an edge when the step is known', () => {
    const values = [98.1, 98.2, 98.2, 98.3, 98.4, 98.4, 98.4, 98.5, 98.9]
    for (const { lower } of histogram(values, 0.1).bins) {
      for (const value of values) expect(Math.abs(value - lower)).toBeGreaterThan(0.04)
    }
  })

  it('keeps to a hundred bins for a lone far value', () => {
    expect(histogram([...Array.from({ length: 50 }, (_, i) => i % 5), 1e9]).bins.length).toBeLessThanOrEqual(MOST_BINS + 1)
  })

  it('says when there is nothing to spread', () => {
    expect(histogram([])).toEqual({ bins: [], binWidth: null, reason: 'no values' })
    expect(histogram([4, 4])).toMatchObject({ bins: [{ count: 2 }], reason: 'all values are equal' })
    expect(histogram([0, 0]).bins).toHaveLength(1)
    expect(() => histogram([1, NaN])).toThrow('values[1]')
    expect(() => histogram([1], 0)).toThrow('resolution')
  })
})

describe('dot plot', () => {
  it('stacks equal values, ascending', () => {
    expect(dotPlot([3, 1, 3, -0, 0])).toEqual([{ value: 0, count: 2 }, { value: 1, count: 1 }, { value: 3, count: 2 }])
    expect(dotPlot([0.12, 0.08, 0.31], 0.1).map(stack => stack.count)).toEqual([2, 1])
    expect(dotPlot([])).toEqual([])
    expect(() => dotPlot([1], -1)).toThrow('step')
  })
})
