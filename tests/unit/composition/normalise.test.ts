import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decimalsOf, formatPercent, formatUncertainty } from '#shared/composition/format'
import { massFractionsFromMole, moleFractionsFromMass } from '#shared/composition/fractions'
import { normaliseComposition } from '#shared/composition/normalise'
import { checkSum } from '#shared/composition/sum'
import type { ReportedComposition, ReportedPart } from '#shared/composition/types'
import { SUBSTANCES } from '#shared/refrigerants/designations'

const shares = fc.uniqueArray(fc.tuple(fc.constantFrom(...SUBSTANCES, 'air' as const), fc.double({ min: 0.001, max: 1, noNaN: true })), { selector: ([name]) => name, minLength: 1, maxLength: 6 }).map(entries => Object.fromEntries(entries))
const parts: fc.Arbitrary<ReportedPart[]> = fc.uniqueArray(fc.record({ substance: fc.constantFrom(...SUBSTANCES), percent: fc.double({ min: 0.01, max: 100, noNaN: true }), qualifier: fc.constant('<' as const) }, { requiredKeys: ['substance', 'percent'] }), { selector: part => part.substance, minLength: 1, maxLength: 6 })
  .filter(list => list.some(part => part.qualifier === undefined))
const reported: fc.Arbitrary<ReportedComposition> = fc.record({ basis: fc.constantFrom('mass' as const, 'mole' as const), air: fc.constantFrom('apart' as const, 'within' as const), resolution: fc.constantFrom(0.1, 1), parts, airPercent: fc.double({ min: 0, max: 60, noNaN: true }) }, { requiredKeys: ['basis', 'air', 'resolution', 'parts'] })

describe('fractions', () => {
  it('come back from mass to mole and again, sum to one, and do not depend on the scale', () => {
    fc.assert(fc.property(shares, fc.double({ min: 0.1, max: 100, noNaN: true }), (given, scale) => {
      const total = Object.values(given).reduce((sum, value) => sum + value, 0)
      const mole = moleFractionsFromMass(given)
      const back = massFractionsFromMole(mole) as Record<string, number>
      expect(Object.values(mole).reduce((sum: number, value) => sum + value!, 0)).toBeCloseTo(1, 12)
      for (const [name, value] of Object.entries(given)) expect(back[name]).toBeCloseTo(value / total, 12)
      const scaled = moleFractionsFromMass(Object.fromEntries(Object.entries(given).map(([name, value]) => [name, value * scale]))) as Record<string, number>
      for (const [name, value] of Object.entries(mole)) expect(scaled[name]).toBeCloseTo(value!, 12)
    }))
  })

  it('of 2 % air by mass in R-134a are 6.7 % by mole', () => {
    const { air } = normaliseComposition({ basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 100 }], airPercent: 2 })
    expect(air!.massFraction).toBeCloseTo(0.02, 12)
    expect(air!.moleFraction).toBeCloseTo(0.06707, 4)
  })

  it('refuse what is no composition', () => {
    expect(() => moleFractionsFromMass({ 'R-12': -1 })).toThrow(RangeError)
    expect(() => moleFractionsFromMass({ 'R-12': 0 })).toThrow(RangeError)
    expect(() => massFractionsFromMole({ 'R-12': Number.NaN })).toThrow(RangeError)
  })
})

describe('normalisation', () => {
  it('gives fractions that sum to one, each between its bounds, with nothing lost', () => {
    fc.assert(fc.property(reported, (composition) => {
      const normalised = normaliseComposition(composition)
      expect(normalised.parts.reduce((sum, part) => sum + part.massFraction, 0)).toBeCloseTo(1, 10)
      expect(normalised.parts.reduce((sum, part) => sum + part.moleFraction, 0)).toBeCloseTo(1, 10)
      for (const [i, part] of normalised.parts.entries()) {
        expect(part.massFractionLow).toBeLessThanOrEqual(part.massFraction + 1e-12)
        expect(part.massFractionHigh).toBeGreaterThanOrEqual(part.massFraction - 1e-12)
        if (composition.parts[i]!.qualifier === '<') {
          expect(part.massFraction, 'below detection is never silently zero').toBeGreaterThan(0)
          expect(part.massFractionLow).toBe(0)
        }
      }
      expect(normalised.air === null).toBe(composition.airPercent === undefined)
      if (normalised.air) expect(normalised.air.massFraction).toBeLessThanOrEqual(1)
    }))
  })

  it('does not depend on the order of the parts or the size of the whole', () => {
    fc.assert(fc.property(reported, fc.double({ min: 0.2, max: 1, noNaN: true }), (composition, scale) => {
      const one = normaliseComposition(composition)
      const other = normaliseComposition({ ...composition, parts: composition.parts.toReversed().map(part => ({ ...part, percent: part.percent * scale })) }).parts.toReversed()
      for (const [i, part] of one.parts.entries()) expect(other[i]!.massFraction).toBeCloseTo(part.massFraction, 10)
    }))
  })

  it('of what is normalised already changes nothing', () => {
    fc.assert(fc.property(reported, (composition) => {
      const once = normaliseComposition({ ...composition, parts: composition.parts.map(({ substance, percent }) => ({ substance, percent })) })
      const twice = normaliseComposition({ basis: 'mass', air: 'apart', resolution: composition.resolution, parts: once.parts.map(part => ({ substance: part.substance, percent: part.massFraction * 100 })), ...(once.air ? { airPercent: once.air.massFraction * 100 } : {}) })
      for (const [i, part] of once.parts.entries()) expect(twice.parts[i]!.massFraction).toBeCloseTo(part.massFraction, 10)
      if (once.air) expect(twice.air!.moleFraction).toBeCloseTo(once.air.moleFraction, 9)
    }))
  })

  it('tells the same gas from mass and from mole, air within and apart', () => {
    const mass = normaliseComposition({ basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 98 }, { substance: 'R-290', percent: 2 }], airPercent: 2 })
    const mole = normaliseComposition({ basis: 'mole', air: 'within', resolution: 0.1, parts: mass.parts.map(part => ({ substance: part.substance, percent: part.moleFraction * (1 - mass.air!.moleFraction) * 100 })), airPercent: mass.air!.moleFraction * 100 })
    for (const [i, part] of mass.parts.entries()) expect(mole.parts[i]!.massFraction).toBeCloseTo(part.massFraction, 10)
    expect(mole.air!.massFraction).toBeCloseTo(0.02, 10)
  })
})

describe('the sum check', () => {
  const sum = (values: number[], over: Partial<ReportedComposition> = {}) => checkSum({ basis: 'mass', air: 'apart', resolution: 0.1, parts: values.map((percent, i) => ({ substance: SUBSTANCES[i]!, percent })), ...over })
  it('allows what the display explains, flags a little more, refuses a slip', () => {
    expect(sum([99.4, 0.6]).outcome).toBe('agrees')
    expect(sum([99.4, 0.3]).outcome).toBe('agrees')
    expect(sum([99.4, 0.2]).outcome).toBe('flagged')
    expect(sum([97, 0]).outcome).toBe('refused')
    expect(sum([0.994, 0.006]).outcome).toBe('refused')
    expect(sum([101.2, 0]).outcome).toBe('refused')
  })

  it('counts air within the hundred only where it is reported so, and a detection limit as up to itself', () => {
    expect(sum([94], { air: 'within', airPercent: 6 }).outcome).toBe('agrees')
    expect(sum([94], { air: 'apart', airPercent: 6 }).outcome).toBe('refused')
    expect(checkSum({ basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 98 }, { substance: 'HC', percent: 2, qualifier: '<' }] }).outcome).toBe('agrees')
  })
})

describe('figures', () => {
  it('are the instrument\'s: 98.4, never 98.40000 or 98', () => {
    expect(formatPercent(98.4, 0.1)).toBe('98.4')
    expect(formatPercent(98, 0.1)).toBe('98.0')
    expect(formatPercent(98.4, 1)).toBe('98')
    expect(formatPercent(-0.01, 0.1)).toBe('0.0')
    expect(formatUncertainty(0.31, 0.1)).toBe('0.4')
    expect([0.1, 1, 0.05, 0.5, 10].map(decimalsOf)).toEqual([1, 0, 2, 1, 0])
  })
})
