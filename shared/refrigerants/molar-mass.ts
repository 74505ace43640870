import type { Substance } from './designations'

/**
 * Molar masses in grams per mole: those of the equations of state (Tillner-Roth & Baehr 1994 for R-134a,
 * Lemmon & Akasaka 2022 for R-1234yf and others), rounded to three decimals; ASHRAE 34 prints the same to one.
 * Blends: reciprocal of the sum of mass share over molar mass, by the composition in ASHRAE 34.
 */
const MOLAR_MASS: Record<Exclude<Substance, 'HC' | 'OTHER'>, number> = {
  'R-12': 120.913,
  'R-22': 86.468,
  'R-134a': 102.032,
  'R-1234yf': 114.042,
  'R-152a': 66.051,
  'R-290': 44.096,
  'R-600a': 58.122,
  'R-744': 44.010,
  'R-32': 52.024,
  'R-125': 120.021,
  'R-143a': 84.041,
  'R-404A': 97.604,
  'R-407C': 86.204,
  'R-410A': 72.585,
}

/** Dry air, grams per mole (Lemmon et al. 2000). */
export const AIR_MOLAR_MASS = 28.965

/** What a group may weigh: hydrocarbons from propane to butane and isobutane; unidentified gas from the lightest to the heaviest of the catalogue. The central value is the mean of the two; common practice, no source. */
export const GROUP_MOLAR_MASS = {
  HC: { low: 44.096, central: 51.109, high: 58.122 },
  OTHER: { low: 44.010, central: 82.462, high: 120.913 },
} as const

export interface MolarMassRange { low: number, central: number, high: number }

const RANGES = Object.fromEntries([
  ...Object.entries(MOLAR_MASS).map(([substance, value]) => [substance, { low: value, central: value, high: value }]),
  ...Object.entries(GROUP_MOLAR_MASS),
]) as Record<Substance, MolarMassRange>

/** Grams per mole; one value for a refrigerant, a range for a group. */
export function molarMassRange(substance: Substance): MolarMassRange {
  return RANGES[substance]
}

/** Grams per mole; of a group its central value. */
export function molarMassGramsPerMole(substance: Substance | 'air'): number {
  return substance === 'air' ? AIR_MOLAR_MASS : RANGES[substance].central
}
