import { SATURATION_FITS, type Saturated } from './saturation-fits'
import { saturationPressureKilopascal } from './saturation'

export interface PressureTemperatureRow { celsius: number, kilopascalAbsolute: number }

/** Saturation pressures over a range that is cut to where the formula holds. */
export function pressureTemperatureTable({ substance, fromCelsius, toCelsius, stepCelsius }: { substance: Saturated, fromCelsius: number, toCelsius: number, stepCelsius: number }): PressureTemperatureRow[] {
  if (!(stepCelsius > 0)) throw new RangeError('The step must be above 0')
  const { lowestCelsius, highestCelsius } = SATURATION_FITS[substance]
  const rows: PressureTemperatureRow[] = []
  for (let i = 0; fromCelsius + i * stepCelsius <= toCelsius + 1e-9; i++) {
    const celsius = fromCelsius + i * stepCelsius
    if (celsius >= lowestCelsius && celsius <= highestCelsius) rows.push({ celsius, kilopascalAbsolute: saturationPressureKilopascal({ substance, celsius }) })
  }
  return rows
}

