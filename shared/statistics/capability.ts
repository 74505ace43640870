import { standardDeviationOf, summarise } from './describe'
import { chiSquareQuantile } from './distributions'
import { requireFinite, requireNotNegative, requireOpenUnit, requirePositive, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'
import { movingRanges } from './individuals-chart'
import { noncentralityFor } from './noncentral-t'
import { normalCdf, normalQuantile } from './normal'
import { outOfSpecShare, requireLimits, type OutOfSpecShare, type SpecificationLimits } from './out-of-spec'

export interface CapabilityIndices {
  /** (U - L)/6σ; null with one limit only. */
  cp: number | null
  /** (U - m)/3σ and (m - L)/3σ; null without that limit. */
  cpu: number | null
  cpl: number | null
  /** The smaller of the two, or the only one. */
  cpk: number | null
  /** |middle - m| over half the width; null with one limit only. */
  k: number | null
  /** (U - L)/(6 √(σ² + (m - target)²)); null without a target or with one limit only. */
  cpm: number | null
  /** Share of a normal population outside the limits. */
  expectedShareBeyond: number | null
  reason: string | null
}

export interface CapabilityInput {
  mean: number
  /** Within-subgroup σ for Cp and Cpk, the overall standard deviation for Pp and Ppk. */
  sigma: number
  limits: SpecificationLimits
  target?: number
}

/**
 * Capability indices from a mean and a standard deviation; with σ within they are Cp and Cpk, with the overall s Pp and Ppk.
 * One-sided limits (purity, a contaminant) give only the one index.
 * Source: NIST/SEMATECH e-Handbook 6.1.6; ISO 22514-2 (from memory).
 * @throws RangeError on NaN or infinity, a negative sigma or wrong limits.
 */
export function capabilityIndices(input: CapabilityInput): CapabilityIndices {
  const { mean, sigma, limits, target } = input
  requireFinite(mean, 'mean')
  requireNotNegative(sigma, 'sigma')
  requireLimits(limits)
  if (target !== undefined) requireFinite(target, 'target')
  const { lower, upper } = limits
  if (sigma === 0) {
    return { cp: null, cpu: null, cpl: null, cpk: null, k: null, cpm: null, expectedShareBeyond: null, reason: 'no spread: the resolution hides it' }
  }
  const cpu = upper === undefined ? null : (upper - mean) / (3 * sigma)
  const cpl = lower === undefined ? null : (mean - lower) / (3 * sigma)
  const width = lower === undefined || upper === undefined ? null : upper - lower
  return {
    cp: width === null ? null : width / (6 * sigma),
    cpu,
    cpl,
    cpk: Math.min(cpu ?? Infinity, cpl ?? Infinity),
    k: width === null ? null : Math.abs((upper! + lower!) / 2 - mean) / (width / 2),
    cpm: width === null || target === undefined ? null : width / (6 * Math.hypot(sigma, mean - target)),
    expectedShareBeyond: (cpu === null ? 0 : normalCdf(-3 * cpu)) + (cpl === null ? 0 : normalCdf(-3 * cpl)),
    reason: width === null ? 'one limit only: no Cp' : null,
  }
}

/**
 * Interval of Cp or Pp, Ĉ √(χ²/ν).
 * Source: NIST/SEMATECH e-Handbook 6.1.6 (from memory).
 * @param df degrees of freedom of the standard deviation, n - 1 for the overall one
 * @throws RangeError on a wrong argument.
 */
export function capabilityRatioInterval(index: number, df: number, confidence: number): Interval {
  requireNotNegative(index, 'index')
  requirePositive(df, 'df')
  requireOpenUnit(confidence, 'confidence')
  const alpha = 1 - confidence
  return interval(index * Math.sqrt(chiSquareQuantile(alpha / 2, df) / df), index * Math.sqrt(chiSquareQuantile(1 - alpha / 2, df) / df))
}

/**
 * Normal approximation of the interval of Cpk or Ppk, Ĉ ± z √(1/(9n) + Ĉ²/(2(n - 1))).
 * Source: Bissell 1990, Applied Statistics 39, 331 (from memory).
 * @throws RangeError on a wrong argument.
 */
export function approximateCpkInterval(index: number, n: number, confidence: number): Interval {
  requireFinite(index, 'index')
  requireWhole(n, 'n', 1)
  requireOpenUnit(confidence, 'confidence')
  if (n < 2) return noInterval('needs at least two values')
  const half = -normalQuantile((1 - confidence) / 2) * Math.sqrt(1 / (9 * n) + index * index / (2 * (n - 1)))
  return interval(index - half, index + half)
}

/**
 * Exact interval of a one-sided index (m - L)/3s or (U - m)/3s by the noncentral t distribution:
 * δ with P(t'(n - 1, δ) >= 3 Ĉ √n) = α/2, and 1 - α/2, divided by 3 √n.
 * Source: Chou, Owen and Borrego 1990, J. Quality Technology 22, 223 (from memory).
 * @throws RangeError on a wrong argument.
 */
export function exactOneSidedInterval(index: number, n: number, confidence: number): Interval {
  requireFinite(index, 'index')
  requireWhole(n, 'n', 1)
  requireOpenUnit(confidence, 'confidence')
  if (n < 2) return noInterval('needs at least two values')
  const scale = 3 * Math.sqrt(n)
  const tail = (1 - confidence) / 2
  return interval(noncentralityFor(1 - tail, index * scale, n - 1) / scale, noncentralityFor(tail, index * scale, n - 1) / scale)
}

export interface CapabilityStudy {
  n: number
  mean: number | null
  /** Mean moving range over 2/√π. */
  sigmaWithin: number | null
  sigmaOverall: number | null
  within: CapabilityIndices | null
  overall: CapabilityIndices | null
  ppInterval: Interval
  /** Exact with one limit, Bissell's approximation with two. */
  ppkInterval: Interval
  ppkMethod: 'exact' | 'approximate' | null
  /** Observed share outside, always given. */
  outOfSpec: OutOfSpecShare
  /** Whether the indices may be shown, and why not. */
  shown: boolean
  refusals: string[]
  warnings: string[]
}

export interface CapabilityStudySettings {
  limits: SpecificationLimits
  confidence: number
  /** Whether the control chart of the same values gives no signal. */
  chartQuiet: boolean
  /** Vehicle of each value, so that the share outside counts vehicles. */
  subjects?: readonly string[]
}

/** Fewer values than this: shown with a warning (common practice, no source). */
export const FEWEST_FOR_CAPABILITY = 25
/** More than this share at exactly 0 is called piled up there (common practice, no source). */
export const MOST_AT_ZERO = 0.1

/**
 * Capability of values in order of time against their limits. The indices are only shown when the chart is quiet, there is spread
 * and the values aren't piled up at 0 (contaminants are): otherwise the observed share outside stands alone.
 * @throws RangeError on NaN or infinity, wrong limits or confidence.
 */
export function capabilityStudy(values: readonly number[], settings: CapabilityStudySettings): CapabilityStudy {
  const { limits, confidence, chartQuiet, subjects } = settings
  const outOfSpec = outOfSpecShare(values, limits, confidence, subjects)
  const summary = summarise(values)
  const n = summary.n
  const sigmaOverall = standardDeviationOf(summary)
  const ranges = movingRanges(values).filter(range => range !== null)
  const sigmaWithin = ranges.length === 0 ? null : summarise(ranges).mean! * Math.sqrt(Math.PI) / 2
  const refusals: string[] = []
  if (n < 2) refusals.push('needs at least two values')
  if (sigmaOverall === 0) refusals.push('all values are equal: the resolution hides the spread')
  if (!chartQuiet) refusals.push('the control chart shows signals: there is no one process to judge')
  if (values.filter(value => value === 0).length > MOST_AT_ZERO * n) refusals.push('values are piled up at 0: use the share outside')
  const warnings = n >= 2 && n < FEWEST_FOR_CAPABILITY ? ['fewer than twenty-five values: the intervals are wide'] : []
  const shown = refusals.length === 0
  const base = { n, mean: summary.mean, sigmaWithin, sigmaOverall, outOfSpec, shown, refusals, warnings }
  if (!shown) {
    const none = noInterval(refusals[0]!)
    return { ...base, within: null, overall: null, ppInterval: none, ppkInterval: none, ppkMethod: null }
  }
  const mean = summary.mean!
  const overall = capabilityIndices({ mean, sigma: sigmaOverall!, limits })
  const oneSided = overall.cp === null
  return {
    ...base,
    within: capabilityIndices({ mean, sigma: sigmaWithin!, limits }),
    overall,
    ppInterval: oneSided ? noInterval('one limit only: no Pp') : capabilityRatioInterval(overall.cp!, n - 1, confidence),
    ppkInterval: oneSided ? exactOneSidedInterval(overall.cpk!, n, confidence) : approximateCpkInterval(overall.cpk!, n, confidence),
    ppkMethod: oneSided ? 'exact' : 'approximate',
  }
}
