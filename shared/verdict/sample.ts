import type { NormalisedComposition } from '../composition/types'
import type { Designation, Substance } from '../refrigerants/designations'
import { AIR_MOLAR_MASS, molarMassGramsPerMole } from '../refrigerants/molar-mass'
import { belongsTo, showsBlend } from './declared-content'
import { isFlammable, isMildlyFlammable } from './flammable-substances'
import type { ComponentUncertainty, InstrumentUncertainty } from './types'

/** A quantity in percent with its standard uncertainty. */
export interface Quantity {
  percent: number
  /** Standard uncertainty, k = 1. */
  u: number
  /** The part of u² that each sample draws anew: rounding to the display step. The rest repeats with the instrument. */
  roundingVariance: number
  /** The detection limit, where nothing was seen. */
  detectionLimit: number | null
}

export interface Foreign { substance: Substance, quantity: Quantity }

/** What the rules look at, drawn from one sample or from the mean of several. */
export interface JudgedSample {
  /** Declared refrigerant, percent by mass air-free. */
  purity: Quantity
  /** Hydrocarbons and other class 2 and 3 content that was not declared, percent by mass air-free. */
  flammable: Quantity
  /** The same together with class 2L refrigerants that were seen and not declared, and the largest of those; null where none was seen. */
  flammableWithMild: Foreign | null
  /** Not identified, percent by mass air-free. */
  unknown: Quantity
  /** Each other refrigerant, percent by mass air-free. */
  foreign: Foreign[]
  /** Percent by mass of the sample; null where air was not measured. */
  air: Quantity | null
  /** Mean molar mass of the refrigerants over that of air: what turns air by mass into air by mole. */
  molarMassOverAir: number
}

/** What the instrument did not report at all: not measured, which is not the same as none. */
export const NOT_REPORTED: Quantity = { percent: 0, u: 0, roundingVariance: 0, detectionLimit: null }

/** Variance of a rectangle of this half-width (JCGM 100:2008 4.3.7). */
const rectangle = (halfWidth: number): number => halfWidth * halfWidth / 3

/** u² of the instrument's record: absolute and relative part. */
function instrumentVariance({ absolutePercent, relative }: ComponentUncertainty, percent: number): number {
  const scaled = relative * percent
  return absolutePercent * absolutePercent + scaled * scaled
}

function quantity(percent: number, low: number, high: number, belowDetection: boolean, uncertainty: ComponentUncertainty, roundingVariance: number): Quantity {
  const u = Math.sqrt(instrumentVariance(uncertainty, percent) + roundingVariance + rectangle((high - low) / 2))
  return { percent, u, roundingVariance, detectionLimit: belowDetection ? high : null }
}

/** Two contents that are judged together; their uncertainties are independent. */
function plus(a: Quantity, b: Quantity): Quantity {
  if (a === NOT_REPORTED) return b
  if (b === NOT_REPORTED) return a
  return {
    percent: a.percent + b.percent,
    u: Math.sqrt(a.u * a.u + b.u * b.u),
    roundingVariance: a.roundingVariance + b.roundingVariance,
    detectionLimit: a.detectionLimit === null || b.detectionLimit === null ? null : a.detectionLimit + b.detectionLimit,
  }
}

/**
 * Draws what the rules look at from a normalised composition, with the instrument's uncertainty and the
 * display step; both are taken as percent by mass whatever the basis of the report.
 *
 * The purity is what the other parts leave, so it carries the width of each of their bounds as an
 * independent rectangle, and as one more the whole of what the reported sum misses of 100: nobody can
 * tell whose that is.
 */
export function judgedSample(composition: NormalisedComposition, declared: Designation, uncertainty: InstrumentUncertainty, resolutionPercent: number): JudgedSample {
  const { parts, air, sum } = composition
  const roundingVariance = resolutionPercent * resolutionPercent / 12
  const blendShown = showsBlend(declared, parts)
  let flammable = NOT_REPORTED
  let mild = NOT_REPORTED
  let mostMild: Foreign | null = null
  let unknown = NOT_REPORTED
  const foreign: Foreign[] = []
  let declaredParts = 0
  let purityPercent = 0
  let purityVariance = rectangle(sum.differencePercent)
  for (let i = 0; i < parts.length; i++) {
    const part = parts[i]!
    const { substance, belowDetection } = part
    const percent = part.massFraction * 100
    const low = part.massFractionLow * 100
    const high = part.massFractionHigh * 100
    const ofSubstance = uncertainty[substance] ?? uncertainty.default
    if (belongsTo(declared, substance, blendShown)) {
      declaredParts++
      purityPercent += percent
      purityVariance += instrumentVariance(ofSubstance, percent) + (belowDetection ? rectangle((high - low) / 2) : 0)
      continue
    }
    purityVariance += rectangle((high - low) / 2)
    const found = quantity(percent, low, high, belowDetection, ofSubstance, roundingVariance)
    if (substance === 'OTHER') {
      unknown = found
      continue
    }
    if (isFlammable(substance)) flammable = plus(flammable, found)
    if (substance === 'HC') continue
    const entry: Foreign = { substance, quantity: found }
    foreign.push(entry)
    if (percent > 0 && !belowDetection && isMildlyFlammable(substance)) {
      mild = plus(mild, found)
      if (mostMild === null || percent > mostMild.quantity.percent) mostMild = entry
    }
  }
  if (declaredParts === 0) purityVariance += instrumentVariance(uncertainty.default, 0)
  const purityRounding = roundingVariance * Math.max(declaredParts, 1)
  return {
    purity: { percent: purityPercent, u: Math.sqrt(purityVariance + purityRounding), roundingVariance: purityRounding, detectionLimit: null },
    flammable,
    flammableWithMild: mostMild && { substance: mostMild.substance, quantity: plus(flammable, mild) },
    unknown,
    foreign,
    air: air && quantity(air.massFraction * 100, air.massFractionLow * 100, air.massFractionHigh * 100, air.belowDetection, uncertainty.air ?? uncertainty.default, roundingVariance),
    molarMassOverAir: molarMassOverAir(composition),
  }
}

/** From any part that is there: M̄ = M x / w. */
function molarMassOverAir({ parts }: NormalisedComposition): number {
  for (let i = 0; i < parts.length; i++) {
    const { substance, massFraction, moleFraction } = parts[i]!
    if (massFraction > 0) return molarMassGramsPerMole(substance) * moleFraction / massFraction / AIR_MOLAR_MASS
  }
  return 1
}

/**
 * Mean of what several samples reported of one quantity. Only the rounding of the display averages out;
 * what the instrument's record states, and what lies below detection, may be the same in every repeat and
 * is kept whole: u² = mean of (u_i² − r_i) + Σ r_i / n². A sample that did not report the quantity says nothing of it.
 */
function mean(quantities: Quantity[]): Quantity {
  const reported = quantities.filter(q => q !== NOT_REPORTED)
  const n = reported.length
  if (n === 0) return NOT_REPORTED
  let percent = 0
  let repeating = 0
  let rounding = 0
  let limit: number | null = 0
  for (const q of reported) {
    percent += q.percent / n
    repeating += (q.u * q.u - q.roundingVariance) / n
    rounding += q.roundingVariance / (n * n)
    limit = limit === null || q.detectionLimit === null ? null : Math.max(limit, q.detectionLimit)
  }
  return { percent, u: Math.sqrt(repeating + rounding), roundingVariance: rounding, detectionLimit: limit }
}

function meanForeign(samples: JudgedSample[]): Foreign[] {
  const substances = new Set(samples.flatMap(({ foreign }) => foreign.map(({ substance }) => substance)))
  return [...substances].map(substance => ({
    substance,
    quantity: mean(samples.map(({ foreign }) => foreign.find(entry => entry.substance === substance)?.quantity ?? NOT_REPORTED)),
  }))
}

/** The mean of several samples that agree, quantity by quantity. */
export function meanSample(samples: JudgedSample[]): JudgedSample {
  if (samples.length === 1) return samples[0]!
  const airs = samples.map(({ air }) => air).filter(air => air !== null)
  const withMild = samples.map(({ flammableWithMild }) => flammableWithMild).filter(entry => entry !== null)
  return {
    purity: mean(samples.map(({ purity }) => purity)),
    flammable: mean(samples.map(({ flammable }) => flammable)),
    flammableWithMild: withMild.length === 0 ? null : { substance: withMild.at(-1)!.substance, quantity: mean(withMild.map(({ quantity }) => quantity)) },
    unknown: mean(samples.map(({ unknown }) => unknown)),
    foreign: meanForeign(samples),
    air: airs.length === 0 ? null : mean(airs),
    molarMassOverAir: samples.reduce((sum, sample) => sum + sample.molarMassOverAir, 0) / samples.length,
  }
}
