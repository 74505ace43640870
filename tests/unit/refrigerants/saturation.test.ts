import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { CATALOGUE } from '#shared/refrigerants/catalogue'
import { DESIGNATIONS } from '#shared/refrigerants/designations'
import { bubblePressureKilopascal, bubblePressureRaoultKilopascal, vapourMassFractions } from '#shared/refrigerants/mixture'
import { OutOfRange } from '#shared/refrigerants/out-of-range'
import { SATURATED, SATURATION_FITS } from '#shared/refrigerants/saturation-fits'
import { liquidDensityKilogramsPerCubicMetre, saturationPressureKilopascal, saturationSlopeKilopascalPerKelvin, saturationTemperatureCelsius, vapourDensityKilogramsPerCubicMetre } from '#shared/refrigerants/saturation'
import { NoWarmingPotential, warmingPotential } from '#shared/refrigerants/warming'
import { lowerFlammableLimitVolumePercent } from '#shared/refrigerants/flammability'

const state = fc.constantFrom(...SATURATED).chain(substance => fc.record({
  substance: fc.constant(substance),
  celsius: fc.double({ min: SATURATION_FITS[substance].lowestCelsius, max: SATURATION_FITS[substance].highestCelsius, noNaN: true }),
}))

describe('the saturation line', () => {
  it('gives the temperature back from its pressure', () => {
    fc.assert(fc.property(state, ({ substance, celsius }) => {
      expect(saturationTemperatureCelsius({ substance, kilopascalAbsolute: saturationPressureKilopascal({ substance, celsius }) })).toBeCloseTo(celsius, 8)
    }))
  })

  it('rises, with the slope that its differences show; liquid is denser than vapour', () => {
    fc.assert(fc.property(state, ({ substance, celsius }) => {
      fc.pre(celsius + 0.01 < SATURATION_FITS[substance].highestCelsius && celsius - 0.01 > SATURATION_FITS[substance].lowestCelsius)
      const rise = (saturationPressureKilopascal({ substance, celsius: celsius + 0.01 }) - saturationPressureKilopascal({ substance, celsius: celsius - 0.01 })) / 0.02
      expect(rise).toBeGreaterThan(0)
      expect(saturationSlopeKilopascalPerKelvin({ substance, celsius }) / rise).toBeCloseTo(1, 4)
      expect(liquidDensityKilogramsPerCubicMetre({ substance, celsius })).toBeGreaterThan(vapourDensityKilogramsPerCubicMetre({ substance, celsius }))
    }))
  })

  it('is refused outside its range, never extrapolated', () => {
    for (const substance of SATURATED) {
      const { lowestCelsius, highestCelsius } = SATURATION_FITS[substance]
      for (const celsius of [lowestCelsius - 0.01, highestCelsius + 0.01, Number.NaN, Infinity]) {
        for (const property of [saturationPressureKilopascal, saturationSlopeKilopascalPerKelvin, liquidDensityKilogramsPerCubicMetre, vapourDensityKilogramsPerCubicMetre]) expect(() => property({ substance, celsius })).toThrow(OutOfRange)
      }
      expect(() => saturationTemperatureCelsius({ substance, kilopascalAbsolute: 1 })).toThrow(OutOfRange)
      expect(() => saturationTemperatureCelsius({ substance, kilopascalAbsolute: 1e5 })).toThrow(OutOfRange)
    }
  })
})

describe('a mixture\'s bubble pressure', () => {
  it('of one substance is its saturation pressure, whatever the amount', () => {
    fc.assert(fc.property(state, fc.double({ min: 0.01, max: 5, noNaN: true }), ({ substance, celsius }, amount) => {
      const pure = saturationPressureKilopascal({ substance, celsius })
      expect(bubblePressureKilopascal({ liquidMassFractions: { [substance]: amount }, celsius }).kilopascalAbsolute).toBeCloseTo(pure, 8)
      expect(bubblePressureRaoultKilopascal({ liquidMassFractions: { [substance]: amount }, celsius })).toBeCloseTo(pure, 8)
    }))
  })

  it('does not depend on the order in which the parts are named', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 0.98, noNaN: true }), fc.double({ min: 0, max: 50, noNaN: true }), (share, celsius) => {
      for (const [a, b] of [['R-134a', 'R-290'], ['R-12', 'R-152a'], ['R-22', 'R-134a']] as const) {
        const forward = bubblePressureKilopascal({ liquidMassFractions: { [a]: share, [b]: 1 - share }, celsius })
        const backward = bubblePressureKilopascal({ liquidMassFractions: { [b]: 1 - share, [a]: share }, celsius })
        expect(forward.kilopascalAbsolute).toBeCloseTo(backward.kilopascalAbsolute, 8)
      }
    }))
  })

  it('says where it is only a lower estimate', () => {
    expect(bubblePressureKilopascal({ liquidMassFractions: { 'R-1234yf': 0.9, 'R-22': 0.1 }, celsius: 25 }).lowerEstimate).toBe(true)
    expect(bubblePressureKilopascal({ liquidMassFractions: { 'R-134a': 0.9, 'R-22': 0.1 }, celsius: 25 }).lowerEstimate).toBe(false)
  })

  it('leaves the more volatile part richer in the vapour', () => {
    const vapour = vapourMassFractions({ liquidMassFractions: { 'R-134a': 0.9, 'R-22': 0.1 }, celsius: 25 })
    expect(vapour['R-22']!).toBeGreaterThan(0.1)
    expect(vapour['R-22']! + vapour['R-134a']!).toBeCloseTo(1, 12)
  })
})

describe('the catalogue', () => {
  it('knows every designation, each number with a source and a mark', () => {
    for (const designation of DESIGNATIONS) {
      const entry = CATALOGUE[designation]
      expect(entry.molarMassGramsPerMole).toBeGreaterThan(40)
      for (const sourced of [entry.safetyClass, entry.ozoneDepletion, entry.transport]) {
        expect(sourced.source.length, designation).toBeGreaterThan(4)
        expect(['verified', 'from memory', 'common practice, no source']).toContain(sourced.mark)
      }
      if (entry.blend) expect(Object.values(entry.blend).reduce((sum, part) => sum + part, 0)).toBe(100)
      expect(entry.safetyClass.value === 'A1' || entry.lowerFlammableLimitVolumePercent !== null, designation).toBe(true)
    }
  })

  it('names no warming potential where a set has none, and refuses to compute with it', () => {
    expect(() => warmingPotential({ set: 'AR6', designation: 'R-600a' })).toThrow(NoWarmingPotential)
    expect(() => warmingPotential({ set: 'AR6', massShares: { 'R-134a': 0.5, 'OTHER': 0.5 } })).toThrow(RangeError)
  })

  it('never computes a flammable limit with a part that does not burn', () => {
    expect(() => lowerFlammableLimitVolumePercent({ volumeParts: { 'R-290': 2, 'R-134a': 98 }, lowerLimits: { 'R-290': 2.1, 'R-134a': null } })).toThrow(/fuels only/)
  })
})
