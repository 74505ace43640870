import { standardDeviationOf, summarise } from './describe'
import { fQuantile, tQuantile } from './distributions'
import { requireAllFinite, requireFinite, requireNotNegative, requireOpenUnit, requirePositive, requireSameLength, requireWhole } from './guards'

export interface CheckStandardHistory {
  /** Averages of the check standard, one per day. */
  values: readonly number[]
  /** Standard deviation of each day's repeats. */
  shortTermStandardDeviations: readonly number[]
  /** Repeats per day, J. */
  repeats: number
}

export interface CheckStandardLimits {
  mean: number | null
  /** Of the daily averages, K - 1 degrees of freedom. */
  level2StandardDeviation: number | null
  level2Df: number | null
  /** Of the repeats, pooled, K(J - 1) degrees of freedom. */
  level1StandardDeviation: number | null
  level1Df: number | null
  /** For a daily average: m ± t s₂. */
  lower: number | null
  upper: number | null
  /** For the standard deviation of a day's repeats: s₁ √F. */
  shortTermLimit: number | null
  /** Fewer than fifteen results (common practice, no source). */
  provisional: boolean
  reason: string | null
}

/** Fewer results than this: limits provisional. */
export const FEWEST_FOR_CHECK_STANDARD = 15

/**
 * Baseline and limits of a check standard.
 * Source: NIST/SEMATECH e-Handbook 2.6.2; 2.2.2 and 2.2.3 (from memory).
 * @param alpha for example 0.05
 * @throws RangeError on NaN or infinity or a wrong argument.
 */
export function checkStandardLimits(history: CheckStandardHistory, alpha: number): CheckStandardLimits {
  const { values, shortTermStandardDeviations, repeats } = history
  requireAllFinite(values, 'values')
  shortTermStandardDeviations.forEach((s, i) => requireNotNegative(s, `shortTermStandardDeviations[${i}]`))
  requireSameLength(values, 'values', shortTermStandardDeviations, 'shortTermStandardDeviations')
  requireWhole(repeats, 'repeats', 2)
  requireOpenUnit(alpha, 'alpha')
  const summary = summarise(values)
  const k = summary.n
  const s2 = standardDeviationOf(summary)
  const provisional = k < FEWEST_FOR_CHECK_STANDARD
  if (s2 === null) {
    return {
      mean: summary.mean, level2StandardDeviation: null, level2Df: null, level1StandardDeviation: null, level1Df: null,
      lower: null, upper: null, shortTermLimit: null, provisional, reason: 'needs results of at least two days',
    }
  }
  const s1 = Math.sqrt(shortTermStandardDeviations.reduce((sum, s) => sum + s * s, 0) / k)
  const level1Df = k * (repeats - 1)
  const half = tQuantile(1 - alpha / 2, k - 1) * s2
  return {
    mean: summary.mean,
    level2StandardDeviation: s2,
    level2Df: k - 1,
    level1StandardDeviation: s1,
    level1Df,
    lower: summary.mean! - half,
    upper: summary.mean! + half,
    shortTermLimit: s1 * Math.sqrt(fQuantile(1 - alpha, repeats - 1, level1Df)),
    provisional,
    reason: provisional ? 'fewer than fifteen results: the limits are provisional' : null,
  }
}

/** Calibration line reading = intercept + slope × reference, with its residual standard deviation. */
export interface CalibrationLine {
  intercept: number
  slope: number
  residualStandardDeviation: number
  df: number
}

export interface LevelReading {
  reference: number
  reading: number
}

export interface RangeControl {
  /** Same for all readings, in units of the reference. */
  limit: number
  points: { reference: number, reading: number, deviation: number, beyond: boolean }[]
}

/**
 * Control of an instrument over its range: deviation (y - a)/b - x against ±t s/b with t at 1 - α/(2m) for m levels.
 * A new calibration starts a new chart.
 * Source: NIST/SEMATECH e-Handbook 2.3.7.1.
 * @param levels number of reference levels measured each time, m
 * @throws RangeError on NaN or infinity or a wrong argument.
 */
export function rangeControl(line: CalibrationLine, readings: readonly LevelReading[], levels: number, alpha: number): RangeControl {
  requireFinite(line.intercept, 'intercept')
  requireFinite(line.slope, 'slope')
  if (line.slope === 0) throw new RangeError('slope must not be 0')
  requireNotNegative(line.residualStandardDeviation, 'residualStandardDeviation')
  requirePositive(line.df, 'df')
  requireWhole(levels, 'levels', 1)
  requireOpenUnit(alpha, 'alpha')
  const limit = tQuantile(1 - alpha / (2 * levels), line.df) * line.residualStandardDeviation / Math.abs(line.slope)
  return {
    limit,
    points: readings.map(({ reference, reading }, i) => {
      requireFinite(reference, `readings[${i}].reference`)
      requireFinite(reading, `readings[${i}].reading`)
      const deviation = (reading - line.intercept) / line.slope - reference
      return { reference, reading, deviation, beyond: Math.abs(deviation) > limit }
    }),
  }
}
