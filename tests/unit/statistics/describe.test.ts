import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  addToSummary, describe as describeValues, EMPTY_SUMMARY, lag1Autocorrelation, mean, mergeSummaries, standardDeviation,
  standardDeviationOf, summarise, type PartialSummary,
} from '#shared/statistics/describe'

const value = fc.double({ min: -1e6, max: 1e6, noNaN: true })
const values = fc.array(value, { minLength: 2, maxLength: 40 })

function close(a: PartialSummary, b: PartialSummary): void {
  expect(a.n).toBe(b.n)
  const scale = Math.max(1, Math.abs(b.mean ?? 0))
  expect(Math.abs((a.mean ?? 0) - (b.mean ?? 0))).toBeLessThanOrEqual(1e-9 * scale + 1e-9)
  expect(Math.abs(a.m2 - b.m2)).toBeLessThanOrEqual(1e-9 * (b.m2 + 1e6))
}

describe('describe', () => {
  it('keeps the certified values of NIST StRD NumAcc1 and NumAcc2', () => {
    expect(standardDeviation([10000001, 10000003, 10000002])).toBe(1)
    const numAcc2 = [1.2, ...Array.from({ length: 500 }, () => [1.1, 1.3]).flat()]
    expect(mean(numAcc2)).toBeCloseTo(1.2, 14)
    expect(standardDeviation(numAcc2)).toBeCloseTo(0.1, 14)
    expect(lag1Autocorrelation(numAcc2)).toBeCloseTo(-0.999, 12)
  })

  it('meets the rounding floor of NIST StRD NumAcc4', () => {
    const numAcc4 = [10000000.2, ...Array.from({ length: 500 }, () => [10000000.1, 10000000.3]).flat()]
    expect(Math.abs(standardDeviation(numAcc4)! / 0.1 - 1)).toBeLessThan(1e-8)
  })

  it('says why nothing or one value or equal values give less', () => {
    expect(describeValues([])).toMatchObject({ n: 0, mean: null, standardDeviation: null, median: null, range: null, reason: 'no values' })
    expect(describeValues([7.5])).toMatchObject({ n: 1, mean: 7.5, standardDeviation: null, standardError: null, median: 7.5, range: 0 })
    expect(describeValues([0.1, 0.1, 0.1])).toMatchObject({ mean: 0.1, standardDeviation: 0, lag1: null, reason: 'all values are equal' })
  })

  it('refuses what is not a number', () => {
    for (const bad of [NaN, Infinity, -Infinity]) {
      expect(() => describeValues([1, bad])).toThrow(new RangeError(`values[1] must be a finite number, not ${bad}`))
      expect(() => addToSummary(EMPTY_SUMMARY, bad)).toThrow(RangeError)
    }
    expect(() => mergeSummaries([{ n: 2, mean: null, m2: 1 }])).toThrow('parts[0].mean')
    expect(() => mergeSummaries([{ n: 2, mean: 1, m2: -1 }])).toThrow('parts[0].m2')
  })

  it('gives the same in one pass, in two, and merged from parts in any grouping', () => {
    fc.assert(fc.property(values, values, values, (a, b, c) => {
      const whole = summarise([...a, ...b, ...c])
      const [pa, pb, pc] = [summarise(a), summarise(b), summarise(c)]
      close(mergeSummaries([pa, pb, pc]), whole)
      close(mergeSummaries([pa, mergeSummaries([pb, pc])]), whole)
      close(mergeSummaries([pc, EMPTY_SUMMARY, pa, pb]), whole)
      close([...a, ...b, ...c].reduce(addToSummary, EMPTY_SUMMARY), whole)
    }))
  })

  it('takes an empty part as nothing', () => {
    fc.assert(fc.property(values, (list) => {
      const part = summarise(list)
      expect(mergeSummaries([EMPTY_SUMMARY, part])).toEqual(part)
      expect(mergeSummaries([part, EMPTY_SUMMARY])).toEqual(part)
    }))
  })

  it('follows a shift and a scale, and ignores the order', () => {
    fc.assert(fc.property(values, fc.integer({ min: -1000, max: 1000 }), fc.integer({ min: 1, max: 64 }), (list, shift, scale) => {
      const plain = summarise(list)
      const moved = summarise(list.map(x => scale * x + shift))
      const size = 1 + scale * Math.max(...list.map(Math.abs)) + Math.abs(shift)
      expect(Math.abs(moved.mean! - (scale * plain.mean! + shift))).toBeLessThanOrEqual(1e-12 * size)
      expect(Math.abs(standardDeviationOf(moved)! - scale * standardDeviationOf(plain)!)).toBeLessThanOrEqual(1e-12 * size)
      const turned = summarise([...list].reverse())
      expect(Math.abs(turned.mean! - plain.mean!)).toBeLessThanOrEqual(1e-15 * size)
      expect(Math.abs(standardDeviationOf(turned)! - standardDeviationOf(plain)!)).toBeLessThanOrEqual(1e-13 * size)
    }))
  })

  it('keeps the mean between the extremes and lag 1 between -1 and 1', () => {
    fc.assert(fc.property(values, (list) => {
      const d = describeValues(list)
      expect(d.mean).toBeGreaterThanOrEqual(d.minimum! - 1e-9)
      expect(d.mean).toBeLessThanOrEqual(d.maximum! + 1e-9)
      if (d.lag1 !== null) expect(Math.abs(d.lag1)).toBeLessThanOrEqual(1 + 1e-12)
    }))
  })
})
