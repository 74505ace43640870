import { standardDeviationOf, summarise } from './describe'
import { requireAllFinite, requireNotNegative, requireWhole } from './guards'

/** One run of a nested study: average and standard deviation of the repeats of each of its days. */
export interface NestedRun {
  averages: readonly number[]
  standardDeviations: readonly number[]
}

export interface NestedLevel {
  standardDeviation: number
  df: number
}

export interface NestedStudy {
  /** Repeats within a day; day averages within a run; run averages. */
  repeats: NestedLevel
  days: NestedLevel
  /** null with one run only: nothing is known about stability. */
  runs: NestedLevel | null
  /** Variance components as they come out; a negative one is shown as 0. */
  daysVariance: number
  runsVariance: number | null
  reason: string | null
}

export type NestedStudyResult = NestedStudy | { repeats: null, reason: string }

/**
 * Three-level nested study (repeats in days in runs): level-1 sd pooled over days, level-2 sd of day averages pooled over runs,
 * level-3 sd of run averages; components s₂² - s₁²/J and s₃² - s₂²/K.
 * Source: NIST/SEMATECH e-Handbook 2.4.4.1 and 2.4.5.
 * @param runs each with the same number of days K, at least 2
 * @param repeats J of each day, at least 2
 * @throws RangeError on NaN or infinity or a wrong count.
 */
export function nestedStudy(runs: readonly NestedRun[], repeats: number): NestedStudyResult {
  requireWhole(repeats, 'repeats', 2)
  runs.forEach((run, i) => {
    requireAllFinite(run.averages, `runs[${i}].averages`)
    run.standardDeviations.forEach((s, j) => requireNotNegative(s, `runs[${i}].standardDeviations[${j}]`))
  })
  const days = runs[0]?.averages.length ?? 0
  if (runs.some(run => run.averages.length !== days || run.standardDeviations.length !== days)) {
    return { repeats: null, reason: 'unbalanced: every run needs the same number of days' }
  }
  if (days < 2) return { repeats: null, reason: 'needs at least two days in a run' }
  const spreads = runs.flatMap(run => run.standardDeviations)
  const level1 = spreads.reduce((sum, s) => sum + s * s, 0) / spreads.length
  const parts = runs.map(run => summarise(run.averages))
  const level2 = parts.reduce((sum, part) => sum + part.m2, 0) / (runs.length * (days - 1))
  const level3 = standardDeviationOf(summarise(parts.map(part => part.mean!)))
  const daysVariance = level2 - level1 / repeats
  const runsVariance = level3 === null ? null : level3 * level3 - level2 / days
  return {
    repeats: { standardDeviation: Math.sqrt(level1), df: spreads.length * (repeats - 1) },
    days: { standardDeviation: Math.sqrt(level2), df: runs.length * (days - 1) },
    runs: level3 === null ? null : { standardDeviation: level3, df: runs.length - 1 },
    daysVariance,
    runsVariance,
    reason: level3 === null
      ? 'one run only: nothing is known about stability'
      : daysVariance < 0 || (runsVariance ?? 0) < 0 ? 'a negative component is shown as 0' : null,
  }
}

/**
 * The same from single readings, readings[run][day][repeat], all days with the same number of repeats.
 * @throws RangeError on NaN or infinity.
 */
export function nestedStudyOfReadings(readings: readonly (readonly (readonly number[])[])[]): NestedStudyResult {
  const repeats = readings[0]?.[0]?.length ?? 0
  if (readings.some(run => run.some(day => day.length !== repeats))) {
    return { repeats: null, reason: 'unbalanced: every day needs the same number of repeats' }
  }
  if (repeats < 2) return { repeats: null, reason: 'needs at least two repeats in a day' }
  return nestedStudy(readings.map((run) => {
    const parts = run.map(summarise)
    return { averages: parts.map(part => part.mean!), standardDeviations: parts.map(part => standardDeviationOf(part)!) }
  }), repeats)
}
