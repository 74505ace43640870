import { AIR_MOLAR_MASS, molarMassRange, type MolarMassRange } from '../refrigerants/molar-mass'
import { checkSum } from './sum'
import type { MassFraction, MoleFraction, NormalisedAir, NormalisedComposition, NormalisedPart, ReportedComposition } from './types'

/** Stored with every reading; raised when the rule below changes what it gives. */
export const NORMALISATION_RULE = 'normalise/1'

/** Amount per unit of the reported share: by mass the share itself, by mole times the molar mass. */
function weights(reported: ReportedComposition, i: number, range: MolarMassRange): { low: number, central: number, high: number } {
  const part = reported.parts[i]!
  const hidden = part.qualifier === '<'
  // Below detection: anything from nothing to the limit; half the limit stands for it (substitution by half, named so that it can be disputed).
  const low = hidden ? 0 : part.percent
  const central = hidden ? part.percent / 2 : part.percent
  const high = part.percent
  if (reported.basis === 'mass') return { low, central, high }
  return { low: low * range.low, central: central * range.central, high: high * range.high }
}

/**
 * Puts a reported composition on one basis: mass fractions of the refrigerants without air, which sum to
 * one, and air as a share of the whole sample on both bases. What was reported is kept beside it by the caller.
 *
 * Where something is only known within bounds (below detection; the molar mass of a group reported by
 * mole) each fraction carries its lowest and highest possible value. Air `apart` is a percentage of the
 * whole sample beside refrigerants that make 100 among themselves; `within`, all make 100 together.
 * A composition whose parts are all zero gives zeros; its sum check refuses it.
 */
export function normaliseComposition(reported: ReportedComposition): NormalisedComposition {
  const { parts: given, basis } = reported
  const lows: number[] = []
  const highs: number[] = []
  const centrals: number[] = []
  let low = 0
  let high = 0
  let total = 0
  for (let i = 0; i < given.length; i++) {
    const weight = weights(reported, i, molarMassRange(given[i]!.substance))
    lows.push(weight.low)
    centrals.push(weight.central)
    highs.push(weight.high)
    low += weight.low
    total += weight.central
    high += weight.high
  }
  let amounts = 0
  for (let i = 0; i < given.length; i++) amounts += centrals[i]! / molarMassRange(given[i]!.substance).central
  const parts: NormalisedPart[] = []
  for (let i = 0; i < given.length; i++) {
    const { substance, qualifier } = given[i]!
    const central = centrals[i]!
    const mostOthers = high - highs[i]!
    const leastOthers = low - lows[i]!
    parts.push({
      substance,
      massFraction: share(central, total - central) as MassFraction,
      massFractionLow: share(lows[i]!, mostOthers) as MassFraction,
      massFractionHigh: share(highs[i]!, leastOthers) as MassFraction,
      moleFraction: (amounts > 0 ? central / molarMassRange(substance).central / amounts : 0) as MoleFraction,
      belowDetection: qualifier === '<',
    })
  }
  const meanMolarMass = amounts > 0 ? total / amounts : AIR_MOLAR_MASS
  return { rule: NORMALISATION_RULE, parts, air: normaliseAir(reported, basis === 'mass' ? total : amounts, meanMolarMass), sum: checkSum(reported) }
}

/** The share of `own` in a whole of itself and `others`. */
function share(own: number, others: number): number {
  return own + others > 0 ? own / (own + Math.max(others, 0)) : 0
}

function normaliseAir(reported: ReportedComposition, refrigerants: number, meanMolarMass: number): NormalisedAir | null {
  const { airPercent, airQualifier, air, basis } = reported
  if (airPercent === undefined) return null
  const belowDetection = airQualifier === '<'
  const ofSample = (percent: number) => (air === 'apart' ? percent / 100 : share(percent, refrigerants))
  const central = ofSample(belowDetection ? airPercent / 2 : airPercent)
  const lowest = belowDetection ? 0 : central
  const highest = belowDetection ? ofSample(airPercent) : central
  const mass = (fraction: number) => (basis === 'mass' ? fraction : massFromMole(fraction, meanMolarMass)) as MassFraction
  return {
    massFraction: mass(central),
    massFractionLow: mass(lowest),
    massFractionHigh: mass(highest),
    moleFraction: (basis === 'mole' ? central : moleFromMass(central, meanMolarMass)) as MoleFraction,
    belowDetection,
  }
}

function massFromMole(mole: number, meanMolarMass: number): number {
  const air = mole * AIR_MOLAR_MASS
  return share(air, (1 - mole) * meanMolarMass)
}

function moleFromMass(mass: number, meanMolarMass: number): number {
  const air = mass / AIR_MOLAR_MASS
  return share(air, (1 - mass) / meanMolarMass)
}
