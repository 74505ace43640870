import { AIR_MOLAR_MASS, molarMassRange } from '../refrigerants/molar-mass'
import { checkSum } from './sum'
import type { MassFraction, MoleFraction, NormalisedAir, NormalisedComposition, NormalisedPart, ReportedComposition } from './types'

/** Stored with every reading; raised when the rule below changes what it gives. */
export const NORMALISATION_RULE = 'normalise/2'

/** What stands for a part below detection: half the limit, named so that it can be disputed. Its bounds are nothing and the limit. */
const BELOW_DETECTION_SHARE = 0.5

/** The refrigerants together: lowest, central and highest weight, amount of substance, and molar mass. */
interface Whole {
  low: number
  central: number
  high: number
  amounts: number
  lightestMolarMass: number
  molarMass: number
  heaviestMolarMass: number
}

/**
 * Puts a reported composition on one basis: mass fractions of the refrigerants without air, which sum to
 * one, and air as a share of the whole sample on both bases. What was reported is kept beside it by the caller.
 *
 * Where something is only known within bounds (below detection; the molar mass of a group reported by
 * mole) each fraction carries its lowest and highest possible value: its own weight at one end with those
 * of all others at the other. Air `apart` is a percentage of the whole sample beside refrigerants that
 * make 100 among themselves; `within`, all make 100 together.
 * A composition whose parts are all zero gives zeros; its sum check refuses it.
 */
export function normaliseComposition(reported: ReportedComposition): NormalisedComposition {
  const { parts: given } = reported
  const byMole = reported.basis === 'mole'
  const parts: NormalisedPart[] = []
  const whole: Whole = { low: 0, central: 0, high: 0, amounts: 0, lightestMolarMass: 0, molarMass: 0, heaviestMolarMass: 0 }
  // First the weights, by mass the shares themselves, by mole times the molar mass; then, in their place, the fractions.
  for (let i = 0; i < given.length; i++) {
    const { substance, percent, qualifier } = given[i]!
    const range = molarMassRange(substance)
    const belowDetection = qualifier === '<'
    const shown = belowDetection ? percent * BELOW_DETECTION_SHARE : percent
    const central = byMole ? shown * range.central : shown
    const low = belowDetection ? 0 : byMole ? percent * range.low : percent
    const high = byMole ? percent * range.high : percent
    const amount = central / range.central
    whole.low += low
    whole.central += central
    whole.high += high
    whole.amounts += amount
    whole.lightestMolarMass += amount * range.low
    whole.heaviestMolarMass += amount * range.high
    parts.push({
      substance,
      massFraction: central as MassFraction,
      massFractionLow: low as MassFraction,
      massFractionHigh: high as MassFraction,
      moleFraction: amount as MoleFraction,
      belowDetection,
    })
  }
  for (let i = 0; i < parts.length; i++) {
    const part = parts[i]!
    const mostOthers = whole.high - part.massFractionHigh
    const leastOthers = whole.low - part.massFractionLow
    part.massFraction = share(part.massFraction, whole.central - part.massFraction) as MassFraction
    part.massFractionLow = share(part.massFractionLow, mostOthers) as MassFraction
    part.massFractionHigh = share(part.massFractionHigh, leastOthers) as MassFraction
    part.moleFraction = (whole.amounts > 0 ? part.moleFraction / whole.amounts : 0) as MoleFraction
  }
  if (whole.amounts > 0) {
    whole.lightestMolarMass /= whole.amounts
    whole.molarMass = whole.central / whole.amounts
    whole.heaviestMolarMass /= whole.amounts
  } else whole.lightestMolarMass = whole.molarMass = whole.heaviestMolarMass = AIR_MOLAR_MASS
  return { rule: NORMALISATION_RULE, parts, air: normaliseAir(reported, whole), sum: checkSum(reported) }
}

/** The share of `own` in a whole of itself and `others`; a difference that rounding made negative counts as nothing. */
function share(own: number, others: number): number {
  return own + others > 0 ? own / (own + Math.max(others, 0)) : 0
}

function normaliseAir({ airPercent, airQualifier, air, basis }: ReportedComposition, whole: Whole): NormalisedAir | null {
  if (airPercent === undefined) return null
  const belowDetection = airQualifier === '<'
  const shown = belowDetection ? airPercent * BELOW_DETECTION_SHARE : airPercent
  const least = belowDetection ? 0 : airPercent
  if (basis === 'mass') {
    const central = air === 'apart' ? shown / 100 : share(shown, whole.central)
    return {
      massFraction: central as MassFraction,
      massFractionLow: (air === 'apart' ? least / 100 : share(least, whole.high)) as MassFraction,
      massFractionHigh: (air === 'apart' ? airPercent / 100 : share(airPercent, whole.low)) as MassFraction,
      moleFraction: share(central / AIR_MOLAR_MASS, (1 - central) / whole.molarMass) as MoleFraction,
      belowDetection,
    }
  }
  const ofAmount = (percent: number) => (air === 'apart' ? percent / 100 : share(percent, whole.amounts))
  const byMass = (mole: number, molarMass: number) => share(mole * AIR_MOLAR_MASS, (1 - mole) * molarMass) as MassFraction
  const central = ofAmount(shown)
  return {
    massFraction: byMass(central, whole.molarMass),
    massFractionLow: byMass(ofAmount(least), whole.heaviestMolarMass),
    massFractionHigh: byMass(ofAmount(airPercent), whole.lightestMolarMass),
    moleFraction: central as MoleFraction,
    belowDetection,
  }
}
