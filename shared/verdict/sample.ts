import type { NormalisedComposition } from '../composition/types'
import type { Designation, Substance } from '../refrigerants/designations'
import { belongsTo, isFlammable, isMildlyFlammable, MILDLY_FLAMMABLE_PERCENT } from './flammable-substances'
import type { ComponentUncertainty, InstrumentUncertainty } from './types'

/** A quantity in percent with its standard uncertainty. */
export interface Quantity {
  percent: number
  /** Standard uncertainty, k = 1. */
  u: number
  /** The detection limit, where nothing was seen. */
  detectionLimit: number | null
}

/** What the rules look at, drawn from one sample or from the mean of several. */
export interface JudgedSample {
  /** Declared refrigerant, percent by mass air-free. */
  purity: Quantity
  /** Hydrocarbons and other flammable content that was not declared, percent by mass air-free. */
  flammable: Quantity
  /** Not identified, percent by mass air-free. */
  unknown: Quantity
  /** Each other refrigerant, percent by mass air-free. */
  foreign: { substance: Substance, quantity: Quantity }[]
  /** Percent by mass of the sample; null where air was not measured. */
  air: Quantity | null
}

/** Variance of a rectangle of this half-width (JCGM 100:2008 4.3.7). */
const rectangle = (halfWidth: number): number => halfWidth * halfWidth / 3

function quantity(percent: number, low: number, high: number, belowDetection: boolean, uncertainty: ComponentUncertainty, resolutionPercent: number): Quantity {
  const u2 = uncertainty.absolutePercent ** 2 + (uncertainty.relative * percent) ** 2 + resolutionPercent ** 2 / 12 + rectangle((high - low) / 2)
  return { percent, u: Math.sqrt(u2), detectionLimit: belowDetection ? high : null }
}

/** What the instrument did not report at all: not measured, which is not the same as none. */
export const NOT_REPORTED: Quantity = { percent: 0, u: 0, detectionLimit: null }

/** Two contents that are judged together; their uncertainties are independent. */
function plus(a: Quantity, b: Quantity): Quantity {
  if (a === NOT_REPORTED) return b
  const seen = a.detectionLimit === null || b.detectionLimit === null
  return { percent: a.percent + b.percent, u: Math.hypot(a.u, b.u), detectionLimit: seen ? null : a.detectionLimit! + b.detectionLimit! }
}

/** Draws what the rules look at from a normalised composition, with the instrument's uncertainty and the display step. */
export function judgedSample(composition: NormalisedComposition, declared: Designation, uncertainty: InstrumentUncertainty, resolutionPercent: number): JudgedSample {
  let purity = NOT_REPORTED
  let flammable = NOT_REPORTED
  let mild = NOT_REPORTED
  let unknown = NOT_REPORTED
  const foreign: JudgedSample['foreign'] = []
  for (const part of composition.parts) {
    const { substance } = part
    const found = quantity(part.massFraction * 100, part.massFractionLow * 100, part.massFractionHigh * 100, part.belowDetection, uncertainty[substance] ?? uncertainty.default, resolutionPercent)
    if (belongsTo(declared, substance)) purity = plus(purity, found)
    else if (substance === 'OTHER') unknown = plus(unknown, found)
    else {
      if (isFlammable(substance)) flammable = plus(flammable, found)
      if (isMildlyFlammable(substance)) mild = plus(mild, found)
      if (substance !== 'HC') foreign.push({ substance, quantity: found })
    }
  }
  if (mild.percent >= MILDLY_FLAMMABLE_PERCENT) flammable = plus(flammable, mild)
  if (purity === NOT_REPORTED) purity = { percent: 0, u: Math.hypot(uncertainty.default.absolutePercent, resolutionPercent / Math.sqrt(12)), detectionLimit: null }
  const { air } = composition
  return {
    purity, flammable, unknown, foreign,
    air: air && quantity(air.massFraction * 100, air.massFractionLow * 100, air.massFractionHigh * 100, air.belowDetection, uncertainty.air ?? uncertainty.default, resolutionPercent),
  }
}

/**
 * Mean of several samples. The uncertainty of the mean is taken as u/√n: repeats of one instrument share
 * its bias, so this flatters; consistency is tested before, and doubt about flammables counts against.
 */
export function meanSample(samples: JudgedSample[]): JudgedSample {
  if (samples.length === 1) return samples[0]!
  const mean = (quantities: Quantity[]): Quantity => {
    const n = quantities.length
    if (n === 0) return NOT_REPORTED
    let percent = 0
    let u2 = 0
    let limit: number | null = 0
    for (const q of quantities) {
      percent += q.percent / n
      u2 += q.u * q.u
      limit = limit === null || q.detectionLimit === null ? null : Math.max(limit, q.detectionLimit)
    }
    return { percent, u: Math.sqrt(u2) / n, detectionLimit: limit }
  }
  // A sample that left hydrocarbons or the unidentified out must not halve what another one found.
  const meanOfReported = (quantities: Quantity[]) => mean(quantities.filter(q => q !== NOT_REPORTED))
  const substances = new Set(samples.flatMap(sample => sample.foreign.map(({ substance }) => substance)))
  const airs = samples.map(sample => sample.air)
  return {
    purity: mean(samples.map(sample => sample.purity)),
    flammable: meanOfReported(samples.map(sample => sample.flammable)),
    unknown: meanOfReported(samples.map(sample => sample.unknown)),
    foreign: [...substances].map(substance => ({
      substance,
      quantity: mean(samples.map(sample => sample.foreign.find(item => item.substance === substance)?.quantity ?? NOT_REPORTED)),
    })),
    air: airs.every(air => air !== null) ? mean(airs) : airs.at(-1)!,
  }
}
