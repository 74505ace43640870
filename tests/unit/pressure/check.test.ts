import { describe, expect, it } from 'vitest'
import { checkPressure, type PressureCheckInput } from '#shared/pressure/check'
import { explainPressure } from '#shared/pressure/words'
import { saturationPressureKilopascal } from '#shared/refrigerants/saturation'

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
  })
})
