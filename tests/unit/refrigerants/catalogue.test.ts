import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { meanMolarMassGramsPerMole } from '#shared/composition/fractions'
import { CATALOGUE, GWP_SETS, isFlammableClass } from '#shared/refrigerants/catalogue'
import { DESIGNATIONS, SUBSTANCES } from '#shared/refrigerants/designations'
import { flammableLimitKilogramsPerCubicMetre, lowerFlammableLimitVolumePercent } from '#shared/refrigerants/flammability'
import { isSaturated } from '#shared/refrigerants/saturation-fits'
import { saturationTemperatureCelsius } from '#shared/refrigerants/saturation'
import { carbonDioxideEquivalentKilograms, NoWarmingPotential, warmingPotential } from '#shared/refrigerants/warming'
import { STANDARD_ATMOSPHERE_KILOPASCAL } from '#shared/units/pressure'
import { isFlammable, isMildlyFlammable } from '#shared/verdict/flammable-substances'

describe('the catalogue agrees with what is computed', () => {
  it('boiling points with the saturation lines', () => {
    for (const designation of DESIGNATIONS.filter(isSaturated)) {
      const { boilingPointCelsius } = CATALOGUE[designation]
      // R-744 has no liquid at one atmosphere.
      if (designation === 'R-744') expect(boilingPointCelsius).toBeNull()
      else expect(Math.abs(saturationTemperatureCelsius({ substance: designation, kilopascalAbsolute: STANDARD_ATMOSPHERE_KILOPASCAL }) - boilingPointCelsius!.value.bubble), designation).toBeLessThan(0.1)
    }
  })

  it('molar masses and warming potentials of blends with those of their parts', () => {
    for (const designation of DESIGNATIONS) {
      const { blend, molarMassGramsPerMole, gwp } = CATALOGUE[designation]
      if (!blend) continue
      expect(meanMolarMassGramsPerMole(blend), designation).toBeCloseTo(molarMassGramsPerMole, 2)
      for (const set of GWP_SETS) expect(warmingPotential({ set, massShares: blend })).toBeCloseTo(gwp[set]!, 9)
    }
  })

  it('transport divisions with the flammability of the classes', () => {
    for (const designation of DESIGNATIONS) expect(CATALOGUE[designation].transport.value.division, designation).toBe(isFlammableClass(CATALOGUE[designation].safetyClass.value) ? '2.1' : '2.2')
  })

  it('and says why, wherever a set has no warming potential', () => {
    for (const designation of DESIGNATIONS) {
      for (const set of GWP_SETS) if (CATALOGUE[designation].gwp[set] === null) expect(CATALOGUE[designation].gwpNote, designation).toContain(set)
    }
  })
})

describe('what the verdict takes from the catalogue', () => {
  it('are the flammable classes, and hydrocarbons not told apart', () => {
    expect(SUBSTANCES.filter(isFlammable)).toEqual(['R-152a', 'R-290', 'R-600a', 'HC'])
    expect(SUBSTANCES.filter(isMildlyFlammable)).toEqual(['R-1234yf', 'R-32', 'R-143a'])
  })
})

describe('a warming potential', () => {
  const shares = fc.dictionary(fc.constantFrom('R-134a', 'R-12', 'R-22', 'R-744', 'R-404A'), fc.double({ min: 0.01, max: 1, noNaN: true }), { minKeys: 1 })
  it('of a mixture lies between those of its parts, whatever the scale of the shares', () => {
    fc.assert(fc.property(shares, fc.constantFrom(...GWP_SETS), fc.double({ min: 0.1, max: 100, noNaN: true }), (massShares, set, scale) => {
      const of = Object.keys(massShares).map(designation => CATALOGUE[designation as 'R-12'].gwp[set]!)
      const found = warmingPotential({ set, massShares })
      expect(found).toBeGreaterThanOrEqual(Math.min(...of) * (1 - 1e-12))
      expect(found).toBeLessThanOrEqual(Math.max(...of) * (1 + 1e-12))
      expect(warmingPotential({ set, massShares: Object.fromEntries(Object.entries(massShares).map(([name, share]) => [name, share * scale])) }) / found).toBeCloseTo(1, 12)
    }))
  })

  it('means nothing without its set: R-152a crosses 150 between two of them', () => {
    expect(warmingPotential({ set: 'AR5', designation: 'R-152a' })).toBeLessThan(150)
    expect(warmingPotential({ set: 'AR6', designation: 'R-152a' })).toBeGreaterThan(150)
    expect(carbonDioxideEquivalentKilograms({ massKilograms: 2, set: 'AR4', designation: 'R-134a' })).toBe(2860)
  })

  it('is refused of what has none', () => {
    expect(() => warmingPotential({ set: 'AR5', massShares: { 'R-134a': 0.99, 'R-290': 0.01 } })).toThrow(NoWarmingPotential)
    expect(() => warmingPotential({ set: 'AR4', massShares: {} })).toThrow(RangeError)
    expect(() => warmingPotential({ set: 'AR4', massShares: { 'R-12': -1 } })).toThrow(RangeError)
    expect(() => warmingPotential({ set: 'AR4', massShares: { air: 1 } })).toThrow(RangeError)
  })
})

describe('the lower flammable limit', () => {
  const FUELS = DESIGNATIONS.filter(designation => CATALOGUE[designation].lowerFlammableLimitVolumePercent !== null)
  const lowerLimits = Object.fromEntries(DESIGNATIONS.map(designation => [designation, CATALOGUE[designation].lowerFlammableLimitVolumePercent?.value ?? null]))

  it('of one fuel is its own, of several lies between theirs, whatever the order and scale', () => {
    for (const fuel of FUELS) expect(lowerFlammableLimitVolumePercent({ volumeParts: { [fuel]: 3 }, lowerLimits })).toBeCloseTo(lowerLimits[fuel]!, 12)
    fc.assert(fc.property(fc.dictionary(fc.constantFrom(...FUELS), fc.double({ min: 0.01, max: 10, noNaN: true }), { minKeys: 1 }), (volumeParts) => {
      const limits = Object.keys(volumeParts).map(fuel => lowerLimits[fuel]!)
      const found = lowerFlammableLimitVolumePercent({ volumeParts, lowerLimits })
      expect(found).toBeGreaterThanOrEqual(Math.min(...limits) - 1e-9)
      expect(found).toBeLessThanOrEqual(Math.max(...limits) + 1e-9)
      const turned = Object.fromEntries(Object.entries(volumeParts).toReversed().map(([fuel, part]) => [fuel, part * 7]))
      expect(lowerFlammableLimitVolumePercent({ volumeParts: turned, lowerLimits })).toBeCloseTo(found, 10)
    }))
  })

  it('is refused as soon as a part does not burn or is not known, however small', () => {
    for (const [other, lowerLimit] of [['R-134a', null], ['HC', undefined], ['R-12', 0]] as const) {
      expect(() => lowerFlammableLimitVolumePercent({ volumeParts: { 'R-290': 99.9, [other]: 0.1 }, lowerLimits: { 'R-290': 2.1, ...(lowerLimit === undefined ? {} : { [other]: lowerLimit }) } }), other).toThrow(/fuels only/)
    }
    expect(() => lowerFlammableLimitVolumePercent({ volumeParts: {}, lowerLimits })).toThrow(RangeError)
  })

  it('by mass is the density of the gas at that share', () => {
    expect(flammableLimitKilogramsPerCubicMetre({ volumePercent: 100, molarMassGramsPerMole: 24.465 })).toBeCloseTo(1, 12)
    expect(flammableLimitKilogramsPerCubicMetre({ volumePercent: 4.8, molarMassGramsPerMole: 66.051 })).toBeCloseTo(0.130, 3)
  })
})
