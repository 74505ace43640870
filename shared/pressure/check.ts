import type { Designation, Substance } from '../refrigerants/designations'
import { molarMassGramsPerMole } from '../refrigerants/molar-mass'
import { bubblePressureKilopascal, bubbleRangeCelsius, type LiquidMassFractions } from '../refrigerants/mixture'
import { OutOfRange } from '../refrigerants/out-of-range'
import { isSaturated } from '../refrigerants/saturation-fits'
import { saturationPressureKilopascal, vapourDensityKilogramsPerCubicMetre } from '../refrigerants/saturation'
import { kelvinFromCelsius } from '../units/temperature'
import { GAS_CONSTANT } from './air-content'

/** More than this unidentified or not told apart, by mass, and no pressure can be expected of it; common practice, no source. */
const MOST_UNIDENTIFIED = 0.01
/** Step for the slope of a mixture's bubble pressure, kelvin. */
const SLOPE_STEP = 0.1

export interface PressureCheckInput {
  /** Refrigerants as identified, air-free mass fractions. */
  parts: Partial<Record<Substance, number>>
  declared: Designation
  temperatureCelsius: number
  /** Standard uncertainty, kelvin. One kelvin is about 20 kPa of R-134a. */
  temperatureUncertaintyKelvin: number
  pressureKilopascal: number
  pressureKind: 'gauge' | 'absolute'
  /** The local barometer; a gauge reading means little without it. */
  barometricKilopascal: number
  /** Standard uncertainty of the pressure, kilopascal. */
  pressureUncertaintyKilopascal: number
}

/**
 * `none`: what is expected. `inside-uncertainty`: an excess, but too small to be told from the doubt, or
 * no more than a pair without published constants may give.
 * `air`: more than the identified composition explains. `contamination-explains`: above the declared
 * refrigerant's saturation, and the other substances found explain it. `no-liquid`: below what any liquid
 * would give: the charge is gas only (low charge). `unidentified`: too much whose pressure is not known.
 * `out-of-range`: outside the range of the formulas.
 */
export type PressureOutcome = 'none' | 'inside-uncertainty' | 'air' | 'contamination-explains' | 'no-liquid' | 'unidentified' | 'out-of-range'

export interface PressureCheck {
  outcome: PressureOutcome
  measuredKilopascalAbsolute: number
  /** Bubble pressure of the identified composition; null where it can't be stated. */
  expectedKilopascalAbsolute: number | null
  /** True where the expectation is only a lower estimate (a pair without published constants). */
  lowerEstimate: boolean
  /** Saturation pressure of the declared refrigerant alone; null where unknown. */
  declaredKilopascalAbsolute: number | null
  /** Measured minus expected. */
  excessKilopascal: number | null
  /** U = 2 √(u_p² + (dp/dT u_T)²). */
  expandedUncertaintyKilopascal: number | null
  /** Air in the vapour by ideal-gas Dalton; null unless the outcome is `air`. */
  airMoleFractionIdeal: number | null
  /** Air in the vapour against the real vapour of the declared refrigerant; null unless the outcome is `air`. */
  airMoleFractionRealVapour: number | null
}

/**
 * Holds a static pressure against the bubble pressure of the identified composition: an independent look
 * at non-condensables, and at a charge that is gas only. Holds for a settled system at one temperature.
 * Never throws for a state outside the formulas: the outcome says so.
 */
export function checkPressure(input: PressureCheckInput): PressureCheck {
  const measured = input.pressureKind === 'gauge' ? input.pressureKilopascal + input.barometricKilopascal : input.pressureKilopascal
  const nothing: PressureCheck = {
    outcome: 'out-of-range', measuredKilopascalAbsolute: measured, expectedKilopascalAbsolute: null, lowerEstimate: false, declaredKilopascalAbsolute: null,
    excessKilopascal: null, expandedUncertaintyKilopascal: null, airMoleFractionIdeal: null, airMoleFractionRealVapour: null,
  }
  const { liquid, unidentified } = identified(input.parts)
  if (unidentified > MOST_UNIDENTIFIED || liquid === null) return { ...nothing, outcome: 'unidentified' }
  try {
    return judge(input, measured, liquid)
  } catch (error) {
    if (error instanceof OutOfRange) return nothing
    throw error
  }
}

/** The part whose pressure is known, and the share that is not. */
function identified(parts: PressureCheckInput['parts']): { liquid: LiquidMassFractions | null, unidentified: number } {
  const liquid: LiquidMassFractions = {}
  let known = 0
  let total = 0
  for (const [substance, share] of Object.entries(parts)) {
    total += share
    if (isSaturated(substance) && share > 0) {
      liquid[substance] = share
      known += share
    }
  }
  return { liquid: known > 0 ? liquid : null, unidentified: total > 0 ? 1 - known / total : 1 }
}

function judge(input: PressureCheckInput, measured: number, liquid: LiquidMassFractions): PressureCheck {
  const { temperatureCelsius: celsius, declared } = input
  const expected = bubblePressureKilopascal({ liquidMassFractions: liquid, celsius })
  const uncertainty = 2 * Math.hypot(input.pressureUncertaintyKilopascal, slopeOf(liquid, celsius) * input.temperatureUncertaintyKelvin)
  const excess = measured - expected.kilopascalAbsolute
  const surelyAbove = measured - expected.highestKilopascalAbsolute
  const alone = isSaturated(declared) ? saturationPressureKilopascal({ substance: declared, celsius }) : null
  const outcome = outcomeOf(excess, surelyAbove, uncertainty, alone === null ? null : measured - alone)
  return {
    outcome,
    measuredKilopascalAbsolute: measured,
    expectedKilopascalAbsolute: expected.kilopascalAbsolute,
    lowerEstimate: expected.lowerEstimate,
    declaredKilopascalAbsolute: alone,
    excessKilopascal: excess,
    expandedUncertaintyKilopascal: uncertainty,
    airMoleFractionIdeal: outcome === 'air' ? excess / measured : null,
    airMoleFractionRealVapour: outcome === 'air' && isSaturated(declared) ? realVapourFraction(excess, declared, celsius) : null,
  }
}

/** Change of the bubble pressure in kilopascal per kelvin, from a step to either side that stays inside the range of the formulas. */
function slopeOf(liquid: LiquidMassFractions, celsius: number): number {
  const { lowestCelsius, highestCelsius } = bubbleRangeCelsius(liquid)
  const low = Math.max(lowestCelsius, celsius - SLOPE_STEP)
  const high = Math.min(highestCelsius, celsius + SLOPE_STEP)
  const at = (step: number) => bubblePressureKilopascal({ liquidMassFractions: liquid, celsius: step }).kilopascalAbsolute
  return (at(high) - at(low)) / (high - low)
}

function outcomeOf(excess: number, surelyAbove: number, uncertainty: number, aboveDeclared: number | null): PressureOutcome {
  if (excess < -uncertainty) return 'no-liquid'
  if (surelyAbove > uncertainty) return 'air'
  if (excess > uncertainty) return 'inside-uncertainty'
  if (aboveDeclared !== null && aboveDeclared > uncertainty) return 'contamination-explains'
  return excess > 0 ? 'inside-uncertainty' : 'none'
}

function realVapourFraction(excess: number, substance: Parameters<typeof vapourDensityKilogramsPerCubicMetre>[0]['substance'], celsius: number): number {
  const air = excess * 1000 / (GAS_CONSTANT * kelvinFromCelsius(celsius))
  const refrigerant = vapourDensityKilogramsPerCubicMetre({ substance, celsius }) * 1000 / molarMassGramsPerMole(substance)
  return air / (air + refrigerant)
}
