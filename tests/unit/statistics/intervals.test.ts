import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { meanInterval, oneSampleT, standardDeviationInterval } from '#shared/statistics/intervals'

const sample = fc.record({
  n: fc.integer({ min: 2, max: 500 }),
  mean: fc.double({ min: -100, max: 100, noNaN: true }),
  standardDeviation: fc.double({ min: 1e-3, max: 10, noNaN: true }),
})
const confidence = fc.double({ min: 0.5, max: 0.999, noNaN: true })

describe('intervals of mean and standard deviation', () => {
  it('hold the estimate and widen with the confidence', () => {
    fc.assert(fc.property(sample, confidence, (s, c) => {
      const mean = meanInterval(s, c)
      expect(mean.lower!).toBeLessThan(s.mean)
      expect(mean.upper!).toBeGreaterThan(s.mean)
      const wider = meanInterval(s, c + (1 - c) / 2)
      expect(wider.lower!).toBeLessThan(mean.lower!)
      const high = standardDeviationInterval(s, Math.max(c, 0.9))
      expect(high.lower!).toBeLessThan(s.standardDeviation)
      expect(high.upper!).toBeGreaterThan(s.standardDeviation)
    }), { numRuns: 50 })
  })

  it('are the dual of the t test', () => {
    fc.assert(fc.property(sample, confidence, (s, c) => {
      const { upper } = meanInterval(s, c)
      expect(oneSampleT(s, upper!).p).toBeCloseTo(1 - c, 8)
    }), { numRuns: 50 })
  })

  it('are refused with a reason', () => {
    expect(meanInterval({ n: 1, mean: 4, standardDeviation: null }, 0.95)).toEqual({ lower: null, upper: null, reason: expect.stringContaining('two values') })
    expect(standardDeviationInterval({ n: 5, standardDeviation: 0 }, 0.95).reason).toContain('resolution')
    expect(oneSampleT({ n: 5, mean: 1, standardDeviation: 0 }, 2)).toMatchObject({ t: null, p: null, df: 4 })
    expect(oneSampleT({ n: 1, mean: 1, standardDeviation: null }, 2).reason).toContain('two values')
  })

  it('refuse what is not a number', () => {
    expect(() => meanInterval({ n: 3, mean: NaN, standardDeviation: 1 }, 0.95)).toThrow('mean')
    expect(() => meanInterval({ n: 3, mean: 1, standardDeviation: -1 }, 0.95)).toThrow('standardDeviation')
    expect(() => meanInterval({ n: 3, mean: 1, standardDeviation: 1 }, 1)).toThrow('confidence')
  })
})
