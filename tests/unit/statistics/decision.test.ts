import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  combineContributions, combinedStandardUncertainty, conformanceProbability, conformanceProbabilityBetween, conformanceProbabilityCutAtZero, conformanceProbabilityT,
  decideGuarded, decideSimple, expandedUncertainty, globalRisk, guardBandFor, largestSpecificFalseAccept, smallestReadingAbove,
} from '#shared/statistics/decision'

const value = fc.double({ min: -50, max: 150, noNaN: true })
const positive = fc.double({ min: 0.01, max: 20, noNaN: true })

describe('an uncertainty', () => {
  it('adds instrument, relative part and display step as squares', () => {
    expect(combinedStandardUncertainty({ value: 50, absolute: 0.3, relative: 0.008, resolution: 0 })).toBeCloseTo(0.5, 12)
    expect(combinedStandardUncertainty({ value: 50, absolute: 0, relative: 0, resolution: 1 })).toBeCloseTo(1 / Math.sqrt(12), 12)
    expect(expandedUncertainty(0.25)).toBe(0.5)
  })

  it('of equal contributions has their degrees of freedom added', () => {
    const { u, dfEffective } = combineContributions({ u: [1, 1], df: [8, 8], coverage: 0.95 })
    expect(u).toBeCloseTo(Math.SQRT2, 12)
    expect(dfEffective).toBeCloseTo(16, 12)
    expect(() => combineContributions({ u: [1], df: [], coverage: 0.95 })).toThrow(RangeError)
  })
})

describe('the probability of conformity', () => {
  it('is one half on the limit, and the two sides make one', () => {
    fc.assert(fc.property(value, positive, value, (at, u, limit) => {
      expect(conformanceProbability({ value: limit, u, limit, kind: 'upper' })).toBe(0.5)
      expect(conformanceProbability({ value: at, u, limit, kind: 'upper' }) + conformanceProbability({ value: at, u, limit, kind: 'lower' })).toBeCloseTo(1, 12)
    }))
  })

  it('between two limits is what neither tail takes', () => {
    fc.assert(fc.property(value, positive, value, positive, (at, u, lower, width) => {
      const upper = lower + width
      const between = conformanceProbabilityBetween({ value: at, u, lower, upper })
      expect(between).toBeCloseTo(conformanceProbability({ value: at, u, limit: upper, kind: 'upper' }) - conformanceProbability({ value: at, u, limit: lower, kind: 'upper' }), 12)
      expect(between).toBeGreaterThanOrEqual(0)
    }))
    expect(() => conformanceProbabilityBetween({ value: 0, u: 1, lower: 2, upper: 1 })).toThrow(RangeError)
  })

  it('cut at zero is lower than uncut near zero, the same far from it, and 0 for a limit of nothing', () => {
    const near = { value: 0.1, u: 0.5, limit: 0.5 }
    // From the definition: P(0 ≤ x ≤ T)/P(x ≥ 0).
    const whole = conformanceProbability({ ...near, limit: 0, kind: 'lower' })
    expect(conformanceProbabilityCutAtZero(near)).toBeCloseTo(conformanceProbabilityBetween({ value: 0.1, u: 0.5, lower: 0, upper: 0.5 }) / whole, 12)
    expect(conformanceProbabilityCutAtZero(near)).toBeLessThan(conformanceProbability({ ...near, kind: 'upper' }))
    expect(conformanceProbabilityCutAtZero({ value: 50, u: 1, limit: 51 })).toBeCloseTo(conformanceProbability({ value: 50, u: 1, limit: 51, kind: 'upper' }), 12)
    expect(conformanceProbabilityCutAtZero({ value: 0.1, u: 0.5, limit: 0 })).toBe(0)
  })

  it('by few degrees of freedom lies nearer to one half, by many is the normal one', () => {
    const on = { value: 1, u: 0.5, limit: 2, kind: 'upper' } as const
    expect(conformanceProbabilityT({ ...on, df: 4 })).toBeLessThan(conformanceProbability(on))
    expect(conformanceProbabilityT({ ...on, df: 1e7 })).toBeCloseTo(conformanceProbability(on), 6)
  })

  it('is refused without an uncertainty', () => {
    for (const u of [0, -1, Number.NaN]) {
      expect(() => conformanceProbability({ value: 1, u, limit: 2, kind: 'upper' })).toThrow(RangeError)
      expect(() => conformanceProbabilityBetween({ value: 1, u, lower: 0, upper: 2 })).toThrow(RangeError)
      expect(() => conformanceProbabilityCutAtZero({ value: 1, u, limit: 2 })).toThrow(RangeError)
      expect(() => conformanceProbabilityT({ value: 1, u, df: 3, limit: 2, kind: 'upper' })).toThrow(RangeError)
    }
  })
})

describe('a decision', () => {
  it('keeps what lies on the limit', () => {
    expect(decideSimple({ value: 98, limit: 98, kind: 'lower' })).toBe('accept')
    expect(decideSimple({ value: 97.9, limit: 98, kind: 'lower' })).toBe('reject')
    expect(decideSimple({ value: 2, limit: 2, kind: 'upper' })).toBe('accept')
    expect(decideSimple({ value: 2.1, limit: 2, kind: 'upper' })).toBe('reject')
  })

  it('with a guard band is the simple one or none, and without width the simple one', () => {
    fc.assert(fc.property(value, value, fc.constantFrom('upper' as const, 'lower' as const), positive, (at, limit, kind, guardBand) => {
      const simple = decideSimple({ value: at, limit, kind })
      expect(['between', simple]).toContain(decideGuarded({ value: at, limit, kind, guardBand }))
      expect(decideGuarded({ value: at, limit, kind, guardBand: 0 })).toBe(simple)
    }))
    expect(decideGuarded({ value: 98.5, limit: 98, kind: 'lower', guardBand: 0.5 })).toBe('accept')
    expect(decideGuarded({ value: 98.4, limit: 98, kind: 'lower', guardBand: 0.5 })).toBe('between')
    expect(decideGuarded({ value: 97.5, limit: 98, kind: 'lower', guardBand: 0.5 })).toBe('between')
    expect(decideGuarded({ value: 97.4, limit: 98, kind: 'lower', guardBand: 0.5 })).toBe('reject')
    expect(() => decideGuarded({ value: 1, limit: 1, kind: 'upper', guardBand: -1 })).toThrow(RangeError)
  })

  it('has a guard band that keeps the wanted risk', () => {
    fc.assert(fc.property(fc.double({ min: 1e-6, max: 0.5, noNaN: true }), positive, (alpha, u) => {
      expect(largestSpecificFalseAccept({ guardBandOverU: guardBandFor({ alpha, u }) / expandedUncertainty(u) })).toBeCloseTo(alpha, 10)
    }))
    const limit = 90
    const reading = smallestReadingAbove({ limit, relativeU: 0.02, confidence: 0.999 })
    expect(conformanceProbability({ value: reading, u: 0.02 * reading, limit, kind: 'lower' })).toBeCloseTo(0.999, 10)
    expect(() => smallestReadingAbove({ limit, relativeU: 0.5, confidence: 0.999 })).toThrow(RangeError)
  })
})

describe('global risks', () => {
  const process = { priorMean: 1, priorSd: 0.5, u: 0.25 }
  it('shrink on one side and grow on the other with the guard band', () => {
    const at = (acceptance: number) => globalRisk({ ...process, tolerance: [null, 2], acceptance: [null, acceptance] })
    expect(at(1.5).falseAccept).toBeLessThan(at(2).falseAccept)
    expect(at(1.5).falseReject).toBeGreaterThan(at(2).falseReject)
  })

  it('of one limit are the mirror image of the other side\'s', () => {
    const upper = globalRisk({ ...process, tolerance: [null, 2], acceptance: [null, 1.5] })
    const lower = globalRisk({ ...process, priorMean: -1, tolerance: [-2, null], acceptance: [-1.5, null] })
    for (const key of ['processConforming', 'falseAccept', 'falseReject'] as const) expect(lower[key]).toBeCloseTo(upper[key], 10)
  })

  it('accept what conforms and what does not, together as often as anything is accepted', () => {
    const { processConforming, falseAccept, falseReject } = globalRisk({ ...process, tolerance: [0, 2], acceptance: [0.2, 1.8] })
    // The reading of an item is normal about the process mean with both variances together.
    const sd = Math.hypot(process.priorSd, process.u)
    expect(processConforming - falseReject + falseAccept).toBeCloseTo(conformanceProbabilityBetween({ value: process.priorMean, u: sd, lower: 0.2, upper: 1.8 }), 8)
    expect(() => globalRisk({ ...process, u: 0, tolerance: [0, 2], acceptance: [0, 2] })).toThrow(RangeError)
  })
})
