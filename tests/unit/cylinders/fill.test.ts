import { describe, expect, it } from 'vitest'
import { fillLimit, liquidFullCelsius } from '#shared/cylinders/fill'
import { addYears, mayBeRefilled } from '#shared/cylinders/requalification'

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
    for (const [substance, celsius] of [['R-134a', 74.8], ['R-1234yf', 71.4], ['R-22', 72.5], ['R-290', 73.5]] as const) expect(liquidFullCelsius({ substance })).toBeCloseTo(celsius, 0)
    expect(liquidFullCelsius({ substance: 'R-600a' }), 'beyond the range').toBeNull()
  })
})

describe('dates and kinds of cylinders', () => {
  it('keep to the calendar', () => {
    expect(addYears('2024-02-29', 1)).toBe('2025-02-28')
    expect(addYears('2024-02-29', 4)).toBe('2028-02-29')
    expect(() => addYears('yesterday', 1)).toThrow(RangeError)
  })

  it('a single-trip cylinder is never refilled', () => {
    expect(mayBeRefilled('DOT 39')).toBe(false)
    expect(mayBeRefilled('DOT 4BA-400')).toBe(true)
  })
})
