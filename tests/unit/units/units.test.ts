import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { kilogramsFromPounds, poundsFromKilograms } from '#shared/units/mass'
import { absoluteFromGauge, barFromKilopascal, gaugeFromAbsolute, kilopascalFromBar, kilopascalFromPsi, psiFromKilopascal } from '#shared/units/pressure'
import { celsiusFromFahrenheit, fahrenheitFromCelsius, kelvinFromCelsius } from '#shared/units/temperature'

describe('units', () => {
  it.each([
    ['water freezes', fahrenheitFromCelsius(0), 32],
    ['water boils', celsiusFromFahrenheit(212), 100],
    ['both scales meet', celsiusFromFahrenheit(-40), -40],
    ['the triple point', kelvinFromCelsius(0.01), 273.16],
    ['an atmosphere in psi', psiFromKilopascal(101.325), 14.695948775514],
    ['a hundred psi in kilopascal', kilopascalFromPsi(100), 689.4757293168],
    ['a bar', kilopascalFromBar(1), 100],
    ['a pound', kilogramsFromPounds(1), 0.45359237],
  ])('%s', (_, found, expected) => {
    expect(found).toBeCloseTo(expected, 10)
  })

  it('come back as they went', () => {
    fc.assert(fc.property(fc.double({ min: -1e4, max: 1e4, noNaN: true }), (value) => {
      for (const [there, back] of [[fahrenheitFromCelsius, celsiusFromFahrenheit], [psiFromKilopascal, kilopascalFromPsi], [barFromKilopascal, kilopascalFromBar], [poundsFromKilograms, kilogramsFromPounds]] as const) {
        expect(back(there(value))).toBeCloseTo(value, 9)
      }
    }))
  })

  it('a gauge reads against the barometer of the place', () => {
    expect(absoluteFromGauge({ gaugeKilopascal: 500, barometricKilopascal: 84 })).toBe(584)
    expect(gaugeFromAbsolute({ kilopascalAbsolute: 84, barometricKilopascal: 84 })).toBe(0)
  })
})
