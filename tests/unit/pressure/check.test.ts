import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { checkPressure, type PressureCheckInput } from '#shared/pressure/check'
import { explainPressure } from '#shared/pressure/words'
import { bubblePressureKilopascal } from '#shared/refrigerants/mixture'
import { saturationPressureKilopascal } from '#shared/refrigerants/saturation'
import { airMassFractionOfContents, airMoleFractionIdeal, airMoleFractionRealVapour, exceedsSettledTable } from '#shared/pressure/air-content'

const base: PressureCheckInput = {
  parts: { 'R-134a': 1 }, declared: 'R-134a', temperatureCelsius: 25, temperatureUncertaintyKelvin: 1, pressureKilopascal: 0, pressureKind: 'absolute',
  barometricKilopascal: 101.325, pressureUncertaintyKilopascal: 5,
}
const saturated = saturationPressureKilopascal({ substance: 'R-134a', celsius: 25 })
const at = (excess: number, over: Partial<PressureCheckInput> = {}) => checkPressure({ ...base, pressureKilopascal: saturated + excess, ...over })

describe('the pressure check', () => {
  it('takes one kelvin for about 20 kPa of R-134a', () => {
    expect(at(0).expandedUncertaintyKilopascal).toBeCloseTo(2 * Math.hypot(5, 19.82), 0)
  })

  it('calls an excess air only beyond the uncertainty, and says both mole fractions', () => {
    expect(at(30).outcome).toBe('inside-uncertainty')
    const air = at(80)
    expect(air.outcome).toBe('air')
    expect(air.airMoleFractionIdeal).toBeCloseTo(80 / (saturated + 80), 9)
    expect(air.airMoleFractionRealVapour!).toBeLessThan(air.airMoleFractionIdeal!)
    expect(explainPressure(air).finding).toMatch(/ideal gas.*real vapour/)
  })

  it('needs the barometer for a gauge reading', () => {
    const gauge = { pressureKind: 'gauge' as const, pressureKilopascal: saturated - 101.325 + 80 }
    expect(checkPressure({ ...base, ...gauge }).outcome).toBe('air')
    expect(checkPressure({ ...base, ...gauge, barometricKilopascal: 60 }).outcome).not.toBe('air')
  })

  it('lets the contamination that was found explain the pressure', () => {
    const contaminated = at(116, { parts: { 'R-134a': 0.98, 'R-290': 0.02 } })
    expect(contaminated.outcome).toBe('contamination-explains')
    expect(explainPressure(contaminated).finding).toContain('no sign of air')
  })

  it('says low charge where no liquid could give so little', () => {
    expect(at(-60).outcome).toBe('no-liquid')
    expect(explainPressure(at(-60)).title).toContain('low charge')
  })

  it('says nothing about air of what was not identified, or outside the formulas', () => {
    expect(at(80, { parts: { 'R-134a': 0.95, 'OTHER': 0.05 } }).outcome).toBe('unidentified')
    expect(at(80, { parts: { HC: 0.05, 'R-134a': 0.95 } }).outcome).toBe('unidentified')
    expect(at(80, { temperatureCelsius: 95 }).outcome).toBe('out-of-range')
    expect(at(80, { parts: {} }).outcome).toBe('unidentified')
    expect(at(80, { declared: 'R-404A', parts: { 'R-125': 0.44, 'R-143a': 0.52, 'R-134a': 0.04 } }).outcome).toBe('unidentified')
    for (const outside of [at(80, { parts: { 'R-134a': 0.95, 'OTHER': 0.05 } }), at(80, { temperatureCelsius: 95 })]) {
      expect(outside).toMatchObject({ expectedKilopascalAbsolute: null, excessKilopascal: null, airMoleFractionIdeal: null })
      expect(explainPressure(outside).finding.length).toBeGreaterThan(20)
    }
  })

  it('holds to the ends of the range of the formulas', () => {
    for (const temperatureCelsius of [-45, 80]) {
      const pressureKilopascal = saturationPressureKilopascal({ substance: 'R-134a', celsius: temperatureCelsius })
      expect(checkPressure({ ...base, temperatureCelsius, pressureKilopascal })).toMatchObject({ outcome: 'none', excessKilopascal: 0 })
    }
    const mixed = { 'R-134a': 0.95, 'R-12': 0.05 }
    for (const [celsius, outcome] of [[-0.1, 'out-of-range'], [0, 'none'], [50, 'none'], [50.1, 'out-of-range']] as const) {
      const pressureKilopascal = celsius < 0 || celsius > 50 ? 700 : bubblePressureKilopascal({ liquidMassFractions: mixed, celsius }).kilopascalAbsolute
      const found = checkPressure({ ...base, declared: 'R-12', parts: mixed, temperatureCelsius: celsius, pressureKilopascal }).outcome
      expect(outcome === 'none' ? found !== 'out-of-range' : found === 'out-of-range', `${celsius} °C: ${found}`).toBe(true)
    }
  })

  it('calls nothing air that a pair without published constants may give', () => {
    const parts = { 'R-1234yf': 0.9, 'R-22': 0.1 }
    const { kilopascalAbsolute, highestKilopascalAbsolute } = bubblePressureKilopascal({ liquidMassFractions: parts, celsius: 25 })
    expect(highestKilopascalAbsolute - kilopascalAbsolute).toBeGreaterThan(60)
    const given = { ...base, declared: 'R-1234yf' as const, parts }
    const doubtful = checkPressure({ ...given, pressureKilopascal: kilopascalAbsolute + 60 })
    expect(doubtful).toMatchObject({ outcome: 'inside-uncertainty', lowerEstimate: true })
    expect(explainPressure(doubtful).finding).toContain('not published')
    const sure = checkPressure({ ...given, pressureKilopascal: highestKilopascalAbsolute + 60 })
    expect(sure.outcome).toBe('air')
    expect(explainPressure(sure).finding).toContain('at most')
  })

  it('says air exactly where the excess is above U, and low charge exactly where it is below −U', () => {
    fc.assert(fc.property(fc.double({ min: -200, max: 200, noNaN: true }), fc.double({ min: 0.1, max: 3, noNaN: true }), fc.double({ min: 0.5, max: 20, noNaN: true }), (excess, temperatureUncertaintyKelvin, pressureUncertaintyKilopascal) => {
      const { outcome, excessKilopascal, expandedUncertaintyKilopascal } = at(excess, { temperatureUncertaintyKelvin, pressureUncertaintyKilopascal })
      expect(outcome === 'air').toBe(excessKilopascal! > expandedUncertaintyKilopascal!)
      expect(outcome === 'no-liquid').toBe(excessKilopascal! < -expandedUncertaintyKilopascal!)
    }))
  })
})

describe('air by pressure', () => {
  const state = { substance: 'R-134a' as const, celsius: 25, kilopascalAbsolute: saturated + 100 }
  it('is less by mole against the real vapour, by about its compressibility', () => {
    const odds = (y: number) => y / (1 - y)
    // Z of R-134a at 25 °C is 0.847 by the equation of state.
    expect(odds(airMoleFractionRealVapour(state)) / odds(airMoleFractionIdeal(state))).toBeCloseTo(0.847, 2)
  })

  it('is nothing at saturation, and less of the contents the more liquid there is', () => {
    expect(airMoleFractionIdeal({ ...state, kilopascalAbsolute: saturated - 5 })).toBe(0)
    expect(airMassFractionOfContents({ ...state, liquidVolumeFraction: 0.8 })).toBeLessThan(airMassFractionOfContents({ ...state, liquidVolumeFraction: 0.2 }))
    expect(airMassFractionOfContents({ ...state, liquidVolumeFraction: 1 })).toBe(0)
    for (const liquidVolumeFraction of [-0.1, 1.1, Number.NaN]) expect(() => airMassFractionOfContents({ ...state, liquidVolumeFraction })).toThrow(RangeError)
  })

  it('of a settled cylinder is held against the printed table, between its lines linearly', () => {
    expect(exceedsSettledTable({ fahrenheit: 70, psig: 76 })).toBe(false)
    expect(exceedsSettledTable({ fahrenheit: 70, psig: 76.1 })).toBe(true)
    expect(exceedsSettledTable({ fahrenheit: 72.5, psig: 79.6 })).toBe(true)
    expect(exceedsSettledTable({ fahrenheit: 90, psig: 109 })).toBe(false)
    for (const fahrenheit of [64.9, 90.1]) expect(() => exceedsSettledTable({ fahrenheit, psig: 80 })).toThrow(RangeError)
  })
})
