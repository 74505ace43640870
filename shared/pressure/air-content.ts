import { AIR_MOLAR_MASS, molarMassGramsPerMole } from '../refrigerants/molar-mass'
import type { Saturated } from '../refrigerants/saturation-fits'
import { liquidDensityKilogramsPerCubicMetre, saturationPressureKilopascal, vapourDensityKilogramsPerCubicMetre } from '../refrigerants/saturation'
import { kelvinFromCelsius } from '../units/temperature'

/** J/(mol K), exactly (SI 2019). */
export const GAS_CONSTANT = 8.31446261815324

interface OnePure { substance: Saturated, celsius: number, kilopascalAbsolute: number }

/** What a settled container shows above saturation, kilopascal (Dalton); negative where it lies below. @throws OutOfRange */
export function pressureExcessKilopascal({ substance, celsius, kilopascalAbsolute }: OnePure): number {
  return kilopascalAbsolute - saturationPressureKilopascal({ substance, celsius })
}

/** Mole fraction of air in the vapour by ideal-gas Dalton: (p − p_sat)/p; 0 where nothing is above saturation. @throws OutOfRange */
export function airMoleFractionIdeal(state: OnePure): number {
  return Math.max(0, pressureExcessKilopascal(state) / state.kilopascalAbsolute)
}

/** The same with the refrigerant's real vapour: air by the ideal-gas law at p − p_sat, refrigerant from its saturated vapour density; lower than the ideal one by about its compressibility. @throws OutOfRange */
export function airMoleFractionRealVapour(state: OnePure): number {
  const air = Math.max(0, pressureExcessKilopascal(state)) * 1000 / (GAS_CONSTANT * kelvinFromCelsius(state.celsius))
  const refrigerant = vapourDensityKilogramsPerCubicMetre(state) * 1000 / molarMassGramsPerMole(state.substance)
  return air / (air + refrigerant)
}

/**
 * Air in the vapour space as a mass fraction of everything in a container (none dissolved in the liquid,
 * which can be as much again in a nearly full one).
 *
 * @param liquidVolumeFraction share of the container's volume that is liquid, 0 to 1.
 * @throws OutOfRange, RangeError
 */
export function airMassFractionOfContents({ liquidVolumeFraction, ...state }: OnePure & { liquidVolumeFraction: number }): number {
  if (!(liquidVolumeFraction >= 0 && liquidVolumeFraction <= 1)) throw new RangeError(`The liquid's share of the volume must lie between 0 and 1, not ${liquidVolumeFraction}`)
  const vapour = 1 - liquidVolumeFraction
  const air = Math.max(0, pressureExcessKilopascal(state)) * 1000 / (GAS_CONSTANT * kelvinFromCelsius(state.celsius)) * AIR_MOLAR_MASS / 1000 * vapour
  const refrigerant = liquidDensityKilogramsPerCubicMetre(state) * liquidVolumeFraction + vapourDensityKilogramsPerCubicMetre(state) * vapour
  return air / (air + refrigerant)
}

/**
 * Most gauge pressure of a settled cylinder of recycled R-134a, psig by °F: the table of the service
 * practice for R-134a (SAE J2211 in 40 CFR 82 Subpart B), from memory; about 5 psi above saturation.
 */
export const SETTLED_R134A_PSIG: Readonly<Record<number, number>> = { 65: 69, 70: 76, 75: 83, 80: 91, 85: 100, 90: 109 }

/** More air than the table allows? Between its temperatures linearly. @throws OutOfRange outside 65 to 90 °F. */
export function exceedsSettledTable({ fahrenheit, psig }: { fahrenheit: number, psig: number }): boolean {
  if (!(fahrenheit >= 65 && fahrenheit <= 90)) throw new RangeError('The table runs from 65 to 90 °F')
  const low = Math.min(85, Math.floor(fahrenheit / 5) * 5)
  const allowed = SETTLED_R134A_PSIG[low]! + (SETTLED_R134A_PSIG[low + 5]! - SETTLED_R134A_PSIG[low]!) * (fahrenheit - low) / 5
  return psig > allowed
}
