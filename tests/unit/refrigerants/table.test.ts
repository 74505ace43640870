import { describe, expect, it } from 'vitest'
import { saturationPressureKilopascal } from '#shared/refrigerants/saturation'
import { pressureTemperatureTable } from '#shared/refrigerants/table'

describe('the pressure table', () => {
  it('goes from end to end in its steps', () => {
    const rows = pressureTemperatureTable({ substance: 'R-134a', fromCelsius: -10, toCelsius: 50, stepCelsius: 0.1 })
    expect(rows).toHaveLength(601)
    expect(rows[0]).toEqual({ celsius: -10, kilopascalAbsolute: saturationPressureKilopascal({ substance: 'R-134a', celsius: -10 }) })
    expect(rows.at(-1)!.celsius).toBeCloseTo(50, 9)
  })

  it('leaves out what the formula does not cover', () => {
    const celsius = pressureTemperatureTable({ substance: 'R-744', fromCelsius: 20, toCelsius: 40, stepCelsius: 5 }).map(row => row.celsius)
    expect(celsius).toEqual([20, 25, 30])
  })

  it('needs a step', () => {
    for (const stepCelsius of [0, -1, Number.NaN]) expect(() => pressureTemperatureTable({ substance: 'R-12', fromCelsius: 0, toCelsius: 1, stepCelsius })).toThrow(RangeError)
  })
})
