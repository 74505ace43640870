import { liquidDensityKilogramsPerCubicMetre } from '../refrigerants/saturation'
import { SATURATION_FITS, type Saturated } from '../refrigerants/saturation-fits'

/** Water at 25 °C, kg/m³ (IAPWS-95). */
export const WATER_KILOGRAMS_PER_CUBIC_METRE = 997.05
/** Liquid may take this share of the volume at 25 °C: AHRI Guideline K practice, from memory. */
export const FILL_FRACTION = 0.8
const REFERENCE_CELSIUS = 25
/** Of the gross weight rating, for a container filled by service equipment: SAE J1989 and J2211, from memory. */
export const GROSS_RATING_FRACTION = 0.6
/** Percent of the water that a cylinder holds: 49 CFR 173.304a(a)(2). R-134a and R-1234yf are not named there. */
export const FILLING_DENSITY_PERCENT: Readonly<Record<string, number>> = { 'R-12': 119, 'R-22': 105, 'R-744': 68 }

/** Most refrigerant that an 80 % liquid fill holds, kg, from the inside volume. @throws OutOfRange */
export function fillMassKilograms({ substance, volumeLitres, celsius = REFERENCE_CELSIUS, fillFraction = FILL_FRACTION }: { substance: Saturated, volumeLitres: number, celsius?: number, fillFraction?: number }): number {
  return fillFraction * volumeLitres / 1000 * liquidDensityKilogramsPerCubicMetre({ substance, celsius })
}

/** The same from the weight of water that the cylinder holds, in the unit of that weight: 0.8 × WC × relative density. */
export function fillMassFromWaterCapacity({ waterCapacity, relativeDensity, fillFraction = FILL_FRACTION }: { waterCapacity: number, relativeDensity: number, fillFraction?: number }): number {
  return fillFraction * waterCapacity * relativeDensity
}

/** Density of the liquid at 25 °C against that of water at 25 °C. @throws OutOfRange */
export function relativeDensityOf({ substance, celsius = REFERENCE_CELSIUS }: { substance: Saturated, celsius?: number }): number {
  return liquidDensityKilogramsPerCubicMetre({ substance, celsius }) / WATER_KILOGRAMS_PER_CUBIC_METRE
}

export type FillRule = '80 percent at 25 °C' | 'filling density' | '60 percent of the gross rating'

export interface FillLimitInput {
  substance: string
  /** Weight of water that it holds; all weights in one unit. */
  waterCapacity: number
  tare: number
  /** Liquid at 25 °C against water; null where the density is not known. */
  relativeDensity: number | null
  /** null where none is marked. */
  grossWeightRating: number | null
  fillFraction?: number
}

export interface FillLimit {
  /** The rules that apply, each with its most net weight. */
  rules: { rule: FillRule, maximumNet: number }[]
  maximumNet: number
  maximumGross: number
  /** The rule that is reached first. */
  strictest: FillRule
}

/**
 * Most net and gross weight by the three rules; the strictest decides and is named. The unit is that of the
 * weights given.
 *
 * @throws RangeError where no rule applies.
 */
export function fillLimit({ substance, waterCapacity, tare, relativeDensity, grossWeightRating, fillFraction = FILL_FRACTION }: FillLimitInput): FillLimit {
  const rules: FillLimit['rules'] = []
  if (relativeDensity !== null) rules.push({ rule: '80 percent at 25 °C', maximumNet: fillMassFromWaterCapacity({ waterCapacity, relativeDensity, fillFraction }) })
  const density = FILLING_DENSITY_PERCENT[substance]
  if (density !== undefined) rules.push({ rule: 'filling density', maximumNet: waterCapacity * density / 100 })
  if (grossWeightRating !== null) rules.push({ rule: '60 percent of the gross rating', maximumNet: Math.max(0, grossWeightRating * GROSS_RATING_FRACTION - tare) })
  const first = rules.toSorted((a, b) => a.maximumNet - b.maximumNet)[0]
  if (!first) throw new RangeError('Neither density nor rating is known, so no fill limit can be given')
  return { rules, maximumNet: first.maximumNet, maximumGross: first.maximumNet + tare, strictest: first.rule }
}

/** What the scale says of a cylinder; all weights in one unit. */
export function scaleReading({ scale, tare, maximumGross }: { scale: number, tare: number, maximumGross: number }): { net: number, roomLeft: number, overFull: boolean } {
  const roomLeft = maximumGross - scale
  return { net: scale - tare, roomLeft, overFull: roomLeft < 0 }
}

/**
 * Temperature at which the liquid fills the whole cylinder (vapour mass and stretching of the shell left
 * out): where its density has fallen to the fill's. Null where that lies beyond the range of the density formula.
 *
 * @throws OutOfRange
 */
export function liquidFullCelsius({ substance, fillFraction = FILL_FRACTION, filledAtCelsius = REFERENCE_CELSIUS }: { substance: Saturated, fillFraction?: number, filledAtCelsius?: number }): number | null {
  const wanted = fillFraction * liquidDensityKilogramsPerCubicMetre({ substance, celsius: filledAtCelsius })
  let low = filledAtCelsius
  let high = SATURATION_FITS[substance].highestCelsius
  if (liquidDensityKilogramsPerCubicMetre({ substance, celsius: high }) > wanted) return null
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2
    if (liquidDensityKilogramsPerCubicMetre({ substance, celsius: middle }) > wanted) low = middle
    else high = middle
  }
  return (low + high) / 2
}
