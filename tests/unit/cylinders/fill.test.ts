import { describe, expect, it } from 'vitest'
import { fillLimit, fillMassFromWaterCapacity, fillMassKilograms, liquidFullCelsius, relativeDensityOf, scaleReading, WATER_KILOGRAMS_PER_CUBIC_METRE } from '#shared/cylinders/fill'
import { addYears, keepUntil, mayBeRefilled, requalificationDue } from '#shared/cylinders/requalification'
import { OutOfRange } from '#shared/refrigerants/out-of-range'

describe('the fill limit', () => {
  it('is the strictest of the rules that apply, and names it', () => {
    const cylinder = { substance: 'R-22', waterCapacity: 50, tare: 28, relativeDensity: 1.1907 }
    expect(fillLimit({ ...cylinder, grossWeightRating: null })).toMatchObject({ strictest: '80 percent at 25 °C', maximumGross: 28 + 0.8 * 50 * 1.1907 })
    expect(fillLimit({ ...cylinder, grossWeightRating: 100 })).toMatchObject({ strictest: '60 percent of the gross rating', maximumNet: 32 })
    expect(fillLimit({ ...cylinder, relativeDensity: null, grossWeightRating: null })).toMatchObject({ strictest: 'filling density', maximumNet: 52.5 })
    expect(() => fillLimit({ ...cylinder, substance: 'OTHER', relativeDensity: null, grossWeightRating: null })).toThrow(RangeError)
  })

  it('of an 80 percent fill at 25 °C is liquid-full where the handbook values say', () => {
    // Computed from the same equations of state for the fit, to 0.1 K.
    for (const [substance, celsius] of [['R-134a', 74.8], ['R-1234yf', 71.4], ['R-22', 72.5], ['R-290', 73.5]] as const) expect(Math.abs(liquidFullCelsius({ substance })! - celsius), substance).toBeLessThan(0.1)
    expect(liquidFullCelsius({ substance: 'R-600a' }), 'beyond the range').toBeNull()
  })
})

describe('the scale', () => {
  it('tells what is in, what still goes in, and when it is too much', () => {
    expect(scaleReading({ scale: 30, tare: 12, maximumGross: 40 })).toEqual({ net: 18, roomLeft: 10, overFull: false })
    expect(scaleReading({ scale: 40, tare: 12, maximumGross: 40 })).toMatchObject({ roomLeft: 0, overFull: false })
    expect(scaleReading({ scale: 40.1, tare: 12, maximumGross: 40 }).overFull).toBe(true)
  })

  it('allows nothing in a cylinder whose tare is above what its rating allows', () => {
    expect(fillLimit({ substance: 'R-134a', waterCapacity: 26, tare: 40, relativeDensity: 1.2, grossWeightRating: 62 })).toMatchObject({ maximumNet: 0, maximumGross: 40 })
  })
})

describe('the mass of an 80 percent fill', () => {
  it('is the same from the volume and from the water that the cylinder holds', () => {
    for (const substance of ['R-134a', 'R-1234yf', 'R-12'] as const) {
      const volumeLitres = 12.3
      const waterCapacity = volumeLitres * WATER_KILOGRAMS_PER_CUBIC_METRE / 1000
      expect(fillMassFromWaterCapacity({ waterCapacity, relativeDensity: relativeDensityOf({ substance }) })).toBeCloseTo(fillMassKilograms({ substance, volumeLitres }), 10)
    }
  })

  it('is refused where the density is not known', () => {
    expect(() => fillMassKilograms({ substance: 'R-744', volumeLitres: 10, celsius: 31 })).toThrow(OutOfRange)
  })
})

describe('dates and kinds of cylinders', () => {
  it('keep to the calendar', () => {
    expect(addYears('2024-02-29', 1)).toBe('2025-02-28')
    expect(addYears('2024-02-29', 4)).toBe('2028-02-29')
    expect(addYears('2024-12-31', 12)).toBe('2036-12-31')
    for (const none of ['yesterday', '2024-13-01', '2024-00-10', '2023-02-29', '2024-04-31', '2024-04-00']) expect(() => addYears(none, 1), none).toThrow(RangeError)
  })

  it('of the next test depend on the method of the last', () => {
    expect(requalificationDue({ testedOn: '2015-03-01', method: 'proof pressure', first: true })).toEqual({ due: '2027-03-01', thenEveryYears: 7 })
    expect(requalificationDue({ testedOn: '2027-03-01', method: 'proof pressure', first: false }).due).toBe('2034-03-01')
    expect(requalificationDue({ testedOn: '2027-03-01', method: 'volumetric expansion', first: false }).due).toBe('2039-03-01')
    expect(requalificationDue({ testedOn: '2027-03-01', method: 'external visual', first: false }).due).toBe('2032-03-01')
    expect(keepUntil({ recordedOn: '2024-02-29', years: 3 })).toBe('2027-02-28')
  })

  it('a single-trip cylinder is never refilled', () => {
    for (const specification of ['DOT 39', 'DOT-39', 'DOT39', 'dot 39 NRC', '39M']) expect(mayBeRefilled(specification), specification).toBe(false)
    for (const specification of ['DOT 4BA-400', 'DOT-4BW390', 'DOT 4B-239']) expect(mayBeRefilled(specification), specification).toBe(true)
  })
})
