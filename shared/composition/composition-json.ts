import type { NormalisedAir, NormalisedComposition, ReportedComposition } from './types'

// Canonical JSON (RFC 8785) written out member by member: intake digests and stores these texts for every
// reading, and a general serialiser took half its time. Tests hold them against one.

/** The reported composition in canonical JSON. */
export function reportedJson({ air, airPercent, airQualifier, basis, parts, resolution }: ReportedComposition): string {
  let text = `{"air":"${air}"`
  if (airPercent !== undefined) text += `,"airPercent":${airPercent}`
  if (airQualifier !== undefined) text += `,"airQualifier":"${airQualifier}"`
  text += `,"basis":"${basis}","parts":[`
  for (let i = 0; i < parts.length; i++) {
    const { percent, qualifier, substance } = parts[i]!
    text += `${i > 0 ? ',' : ''}{"percent":${percent}${qualifier === undefined ? '' : `,"qualifier":"${qualifier}"`},"substance":"${substance}"}`
  }
  return `${text}],"resolution":${resolution}}`
}

/** A fraction to the ten-billionth: what is kept for display; every decision was made with the full number. */
const kept = (fraction: number): number => Math.round(fraction * 1e10) / 1e10

function airJson(air: NormalisedAir | null): string {
  if (!air) return 'null'
  return `{"belowDetection":${air.belowDetection},"massFraction":${kept(air.massFraction)},"massFractionHigh":${kept(air.massFractionHigh)},"massFractionLow":${kept(air.massFractionLow)},"moleFraction":${kept(air.moleFraction)}}`
}

/** The normalised composition in canonical JSON. */
export function compositionJson({ air, parts, rule, sum }: NormalisedComposition): string {
  let text = `{"air":${airJson(air)},"parts":[`
  for (let i = 0; i < parts.length; i++) {
    const part = parts[i]!
    text += `${i > 0 ? ',' : ''}{"belowDetection":${part.belowDetection},"massFraction":${kept(part.massFraction)},"massFractionHigh":${kept(part.massFractionHigh)},"massFractionLow":${kept(part.massFractionLow)},"moleFraction":${kept(part.moleFraction)},"substance":"${part.substance}"}`
  }
  return `${text}],"rule":"${rule}","sum":{"differencePercent":${kept(sum.differencePercent)},"outcome":"${sum.outcome}","percent":${kept(sum.percent)},"tolerancePercent":${kept(sum.tolerancePercent)}}}`
}
