import type { ReportedComposition, SumCheck } from './types'

/** Differences below this are the arithmetic's own. */
const ROUNDING_NOISE = 1e-9
/**
 * Beyond this many times what rounding explains, and beyond this much, it is no composition but a slip;
 * in between it is taken and flagged. Common practice, no source.
 */
const REFUSED_TOLERANCES = 3
const REFUSED_PERCENT = 1

/**
 * Do the reported percentages add up to 100? A display rounds or cuts, so each listed part may be off by
 * up to one step, and what is left out because it is smaller than a step by one more: (n + 1) · step.
 * A part below detection counts as anything from 0 to its limit. Air is counted where it is reported
 * within the 100, and not where it stands apart.
 */
export function checkSum(reported: ReportedComposition): SumCheck {
  let shown = 0
  let hidden = 0
  let counted = 0
  for (const part of reported.parts) {
    if (part.qualifier === '<') hidden += part.percent
    else shown += part.percent
    counted++
  }
  if (reported.air === 'within' && reported.airPercent !== undefined) {
    if (reported.airQualifier === '<') hidden += reported.airPercent
    else shown += reported.airPercent
    counted++
  }
  const tolerancePercent = (counted + 1) * reported.resolution
  // How far 100 lies outside what the sum may be.
  const short = 100 - (shown + hidden)
  const over = shown - 100
  const off = Math.max(short, over, 0)
  const outcome = off <= tolerancePercent + ROUNDING_NOISE
    ? 'agrees'
    : off <= Math.max(REFUSED_TOLERANCES * tolerancePercent, REFUSED_PERCENT) + ROUNDING_NOISE ? 'flagged' : 'refused'
  const percent = short > 0 || hidden === 0 ? shown : Math.min(shown + hidden, Math.max(shown, 100))
  return { percent, differencePercent: percent - 100, tolerancePercent, outcome }
}
