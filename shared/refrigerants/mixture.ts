import { massFractionsFromMole, moleFractionsFromMass } from '../composition/fractions'
import { OutOfRange } from './out-of-range'
import { SATURATION_FITS, type Saturated } from './saturation-fits'
import { saturationPressureKilopascal } from './saturation'

/** Mass fractions of the liquid; they need not sum to one. */
export type LiquidMassFractions = Partial<Record<Saturated, number>>

interface Activity { a: number, b: number, slope: number }

/**
 * Activity constants fitted to bubble pressures from 0 to 50 °C of the multi-fluid Helmholtz model with the
 * binary parameters of Bell & Lemmon 2016 (doi 10.1021/acs.jced.6b00257) and its successors. Two constants
 * (a ≠ b) where one left an error of 1 to 3 %: ln γ1 = x2² (A + 2 (B − A) x1), ln γ2 = x1² (B + 2 (A − B) x2);
 * both move by `slope` per kelvin from 298.15 K. Largest error of the bubble pressure below 2 %.
 */
const ACTIVITY: Readonly<Record<string, Activity>> = {
  'R-134a/R-12': { a: 0.9004, b: 0.8197, slope: -0.00399 },
  'R-134a/R-22': { a: 0.1025, b: 0.1025, slope: -0.000821 },
  'R-134a/R-152a': { a: -0.0919, b: -0.0919, slope: 0.001026 },
  'R-134a/R-290': { a: 1.5688, b: 1.3506, slope: -0.00709 },
  'R-134a/R-600a': { a: 1.3151, b: 1.6181, slope: -0.00821 },
  'R-134a/R-1234yf': { a: 0.2065, b: 0.2065, slope: -0.001116 },
  'R-1234yf/R-152a': { a: 0.2602, b: 0.2602, slope: -0.000995 },
  'R-1234yf/R-290': { a: 0.9152, b: 0.6964, slope: -0.00378 },
  'R-1234yf/R-600a': { a: 0.9079, b: 0.8779, slope: -0.00500 },
  'R-12/R-22': { a: 0.5283, b: 0.3593, slope: -0.00259 },
  'R-12/R-152a': { a: 0.6083, b: 1.0654, slope: -0.00392 },
  'R-290/R-600a': { a: -0.0323, b: -0.1651, slope: -0.00117 },
  'R-22/R-290': { a: 0.7683, b: 0.7683, slope: -0.003401 },
  'R-22/R-152a': { a: -0.1759, b: -0.1759, slope: 0.000286 },
}

/** Temperatures to which the constants were fitted; a mixture outside them is refused. */
const LOWEST_CELSIUS = 0
const HIGHEST_CELSIUS = 50
const FITTED_AT_CELSIUS = 25

/** In place of a pair that has no constants, the strongest of the table: more pressure than that is not reckoned with; common practice, no source. */
const STRONGEST_ACTIVITY = Math.max(...Object.values(ACTIVITY).flatMap(({ a, b }) => [a, b]))

/** The constants of a pair seen from its first member: a for the first, b for the second; null where none are published. */
function activityOf(first: Saturated, second: Saturated, celsius: number): { a: number, b: number } | null {
  const shift = celsius - FITTED_AT_CELSIUS
  const forward = ACTIVITY[`${first}/${second}`]
  if (forward) return { a: forward.a + forward.slope * shift, b: forward.b + forward.slope * shift }
  const backward = ACTIVITY[`${second}/${first}`]
  return backward ? { a: backward.b + backward.slope * shift, b: backward.a + backward.slope * shift } : null
}

function moleFractions(liquid: LiquidMassFractions): [Saturated, number][] {
  return (Object.entries(moleFractionsFromMass(liquid)) as [Saturated, number][]).filter(([, x]) => x > 0)
}

/**
 * ln γ of each component from the excess energy G/RT = Σ pairs x_i x_j (A_ji x_i + A_ij x_j) (Margules),
 * which for two components gives the two-constant form above and for equal constants the symmetric one.
 *
 * @param unpublished both constants of a pair that has none; 0 leaves it ideal.
 * @throws OutOfRange for a mixture outside 0 to 50 °C.
 */
function logActivities(parts: [Saturated, number][], celsius: number, unpublished = 0): { logs: number[], incomplete: boolean } {
  const n = parts.length
  if (n > 1 && !(celsius >= LOWEST_CELSIUS && celsius <= HIGHEST_CELSIUS)) throw new OutOfRange('Temperature of a mixture', celsius, LOWEST_CELSIUS, HIGHEST_CELSIUS, '°C')
  const logs = new Array<number>(n).fill(0)
  let incomplete = false
  let excess = 0
  let homogeneous = 0
  const gradient = new Array<number>(n).fill(0)
  for (let i = 0; i < n; i++) {
    for (let j = i + 1; j < n; j++) {
      const activity = activityOf(parts[i]![0], parts[j]![0], celsius)
      incomplete ||= activity === null
      const [xi, xj] = [parts[i]![1], parts[j]![1]]
      // At infinite dilution of i in j its ln γ is a, of j in i it is b.
      const { a, b } = activity ?? { a: unpublished, b: unpublished }
      const g = xi * xj * (b * xi + a * xj)
      excess += g
      gradient[i]! += xj * (2 * b * xi + a * xj)
      gradient[j]! += xi * (b * xi + 2 * a * xj)
      homogeneous += 3 * g
    }
  }
  for (let i = 0; i < n; i++) logs[i] = excess + gradient[i]! - homogeneous
  return { logs, incomplete }
}

export interface BubblePressure {
  kilopascalAbsolute: number
  /** True where a pair has no published constants (R-1234yf with with anything): Raoult alone is then too low. */
  lowerEstimate: boolean
  /** What such a pair may give at the most; the same as the pressure where all constants are published. */
  highestKilopascalAbsolute: number
}

/** Temperatures in °C for which the bubble pressure of this liquid can be given. */
export function bubbleRangeCelsius(liquid: LiquidMassFractions): { lowestCelsius: number, highestCelsius: number } {
  const parts = moleFractions(liquid)
  const fits = parts.map(([substance]) => SATURATION_FITS[substance])
  const mixture = parts.length > 1
  return {
    lowestCelsius: Math.max(mixture ? LOWEST_CELSIUS : -Infinity, ...fits.map(fit => fit.lowestCelsius)),
    highestCelsius: Math.min(mixture ? HIGHEST_CELSIUS : Infinity, ...fits.map(fit => fit.highestCelsius)),
  }
}

/**
 * Bubble pressure of a liquid of known composition: Σ x_i γ_i p_sat,i, with the activity constants above.
 *
 * @throws OutOfRange outside the range of a saturation line, and for a mixture outside 0 to 50 °C; RangeError where the fractions are no composition.
 */
export function bubblePressureKilopascal({ liquidMassFractions, celsius }: { liquidMassFractions: LiquidMassFractions, celsius: number }): BubblePressure {
  const parts = moleFractions(liquidMassFractions)
  const { logs, incomplete } = logActivities(parts, celsius)
  const pressure = sumOfPressures(parts, logs, celsius)
  return {
    kilopascalAbsolute: pressure,
    lowerEstimate: incomplete,
    highestKilopascalAbsolute: incomplete ? sumOfPressures(parts, logActivities(parts, celsius, STRONGEST_ACTIVITY).logs, celsius) : pressure,
  }
}

function sumOfPressures(parts: [Saturated, number][], logs: number[], celsius: number): number {
  return parts.reduce((sum, [substance, x], i) => sum + x * Math.exp(logs[i]!) * saturationPressureKilopascal({ substance, celsius }), 0)
}

/** The ideal form, Σ x_i p_sat,i: for comparison; the real pressure of refrigerant mixtures is mostly higher. */
export function bubblePressureRaoultKilopascal({ liquidMassFractions, celsius }: { liquidMassFractions: LiquidMassFractions, celsius: number }): number {
  let pressure = 0
  for (const [substance, x] of moleFractions(liquidMassFractions)) pressure += x * saturationPressureKilopascal({ substance, celsius })
  return pressure
}

/** Composition of the vapour over the liquid, by mass: y_i = x_i γ_i p_sat,i / p. */
export function vapourMassFractions({ liquidMassFractions, celsius }: { liquidMassFractions: LiquidMassFractions, celsius: number }): LiquidMassFractions {
  const parts = moleFractions(liquidMassFractions)
  const { logs } = logActivities(parts, celsius)
  return massFractionsFromMole(Object.fromEntries(parts.map(([substance, x], i) => [substance, x * Math.exp(logs[i]!) * saturationPressureKilopascal({ substance, celsius })]))) as LiquidMassFractions
}
