import { kelvinFromCelsius } from '../units/temperature'
import { OutOfRange } from './out-of-range'
import { SATURATION_FITS, type Saturated, type SaturationFit } from './saturation-fits'

function fitAt(substance: Saturated, celsius: number): { fit: SaturationFit, kelvin: number, theta: number } {
  const fit = SATURATION_FITS[substance]
  if (!(celsius >= fit.lowestCelsius && celsius <= fit.highestCelsius)) throw new OutOfRange(`Temperature of ${substance}`, celsius, fit.lowestCelsius, fit.highestCelsius, '°C')
  const kelvin = kelvinFromCelsius(celsius)
  return { fit, kelvin, theta: 1 - kelvin / fit.criticalKelvin }
}

/** ln(p/pc) = (Tc/T)(p0 θ + p1 θ^1.5 + p2 θ^2.5 + p3 θ^5), θ = 1 − T/Tc (Wagner form). */
function logReducedPressure(fit: SaturationFit, kelvin: number): number {
  const theta = 1 - kelvin / fit.criticalKelvin
  const [p0, p1, p2, p3] = fit.pressure
  return fit.criticalKelvin / kelvin * (p0 * theta + p1 * theta ** 1.5 + p2 * theta ** 2.5 + p3 * theta ** 5)
}

/**
 * Saturation pressure, kilopascal absolute, at a temperature in °C: Wagner form fitted to the equation
 * of state named in SATURATION_FITS.
 *
 * @throws OutOfRange outside −45 to 80 °C (R-744: to 30 °C).
 */
export function saturationPressureKilopascal({ substance, celsius }: { substance: Saturated, celsius: number }): number {
  const { fit, kelvin } = fitAt(substance, celsius)
  return fit.criticalKilopascal * Math.exp(logReducedPressure(fit, kelvin))
}

/** Slope dp/dT of the saturation line in kilopascal per kelvin, the derivative of the same formula. @throws OutOfRange */
export function saturationSlopeKilopascalPerKelvin({ substance, celsius }: { substance: Saturated, celsius: number }): number {
  const { fit, kelvin, theta } = fitAt(substance, celsius)
  const [p0, p1, p2, p3] = fit.pressure
  const inner = p0 + 1.5 * p1 * theta ** 0.5 + 2.5 * p2 * theta ** 1.5 + 5 * p3 * theta ** 4
  const log = logReducedPressure(fit, kelvin)
  return fit.criticalKilopascal * Math.exp(log) * (-log / kelvin - inner / kelvin)
}

/**
 * Saturation temperature in °C at an absolute pressure in kilopascal, by Newton's method on ln p inside a bracket.
 *
 * @throws OutOfRange where the pressure belongs to a temperature outside the fitted range.
 */
export function saturationTemperatureCelsius({ substance, kilopascalAbsolute }: { substance: Saturated, kilopascalAbsolute: number }): number {
  const fit = SATURATION_FITS[substance]
  let low = fit.lowestCelsius
  let high = fit.highestCelsius
  const lowest = saturationPressureKilopascal({ substance, celsius: low })
  const highest = saturationPressureKilopascal({ substance, celsius: high })
  if (!(kilopascalAbsolute >= lowest && kilopascalAbsolute <= highest)) throw new OutOfRange(`Pressure of ${substance}`, kilopascalAbsolute, Math.round(lowest * 10) / 10, Math.round(highest * 10) / 10, 'kPa absolute')
  let celsius = (low + high) / 2
  for (let i = 0; i < 60; i++) {
    const pressure = saturationPressureKilopascal({ substance, celsius })
    const excess = Math.log(pressure / kilopascalAbsolute)
    if (Math.abs(excess) < 1e-14) break
    if (excess > 0) high = celsius
    else low = celsius
    const newton = celsius - excess * pressure / saturationSlopeKilopascalPerKelvin({ substance, celsius })
    celsius = newton > low && newton < high ? newton : (low + high) / 2
  }
  return celsius
}

/** Density of the saturated liquid, kg/m³: ρc (1 + Σ l_i θ^(i/3)), i = 1…4. @throws OutOfRange */
export function liquidDensityKilogramsPerCubicMetre({ substance, celsius }: { substance: Saturated, celsius: number }): number {
  const { fit, theta } = fitAt(substance, celsius)
  const [l0, l1, l2, l3] = fit.liquidDensity
  return fit.criticalKilogramsPerCubicMetre * (1 + l0 * theta ** (1 / 3) + l1 * theta ** (2 / 3) + l2 * theta + l3 * theta ** (4 / 3))
}

/** Density of the saturated vapour, kg/m³: ρc exp(v0 θ^(1/3) + v1 θ^(2/3) + v2 θ^(4/3) + v3 θ³ + v4 θ⁶). @throws OutOfRange */
export function vapourDensityKilogramsPerCubicMetre({ substance, celsius }: { substance: Saturated, celsius: number }): number {
  const { fit, theta } = fitAt(substance, celsius)
  const [v0, v1, v2, v3, v4] = fit.vapourDensity
  return fit.criticalKilogramsPerCubicMetre * Math.exp(v0 * theta ** (1 / 3) + v1 * theta ** (2 / 3) + v2 * theta ** (4 / 3) + v3 * theta ** 3 + v4 * theta ** 6)
}
