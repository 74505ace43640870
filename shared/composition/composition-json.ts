import type { NormalisedAir, NormalisedComposition, NormalisedPart, ReportedComposition, ReportedPart } from './types'

// Canonical JSON (RFC 8785): members laid out by hand in the order of their names, written by the engine.
// Tests hold these against a general canonicaliser.

const orderedReported = ({ percent, qualifier, substance }: ReportedPart) => ({ percent, qualifier, substance })

/** The reported composition in canonical JSON. */
export function reportedJson({ air, airPercent, airQualifier, basis, parts, resolution }: ReportedComposition): string {
  return JSON.stringify({ air, airPercent, airQualifier, basis, parts: parts.map(orderedReported), resolution })
}

/** A fraction to the ten-billionth: what is kept for display; every decision was made with the full number. */
const kept = (fraction: number): number => Math.round(fraction * 1e10) / 1e10

const orderedAir = (air: NormalisedAir) => ({
  belowDetection: air.belowDetection,
  massFraction: kept(air.massFraction),
  massFractionHigh: kept(air.massFractionHigh),
  massFractionLow: kept(air.massFractionLow),
  moleFraction: kept(air.moleFraction),
})

const orderedPart = (part: NormalisedPart) => ({
  belowDetection: part.belowDetection,
  massFraction: kept(part.massFraction),
  massFractionHigh: kept(part.massFractionHigh),
  massFractionLow: kept(part.massFractionLow),
  moleFraction: kept(part.moleFraction),
  substance: part.substance,
})

/** The normalised composition in canonical JSON. */
export function compositionJson({ air, parts, rule, sum }: NormalisedComposition): string {
  return JSON.stringify({
    air: air && orderedAir(air),
    parts: parts.map(orderedPart),
    rule,
    sum: { differencePercent: kept(sum.differencePercent), outcome: sum.outcome, percent: kept(sum.percent), tolerancePercent: kept(sum.tolerancePercent) },
  })
}
