import { standardDeviationOf, summarise } from './describe'
import { tQuantile } from './distributions'
import { requireAllFinite, requireNotNegative, requireOpenUnit, requireSameLength } from './guards'
import { type Interval, interval, noInterval } from './interval'
import { meanInterval, oneSampleT } from './intervals'
import { straightLine } from './regression'

export interface Bias {
  n: number
  /** Mean reading minus reference. */
  bias: number | null
  standardDeviation: number | null
  interval: Interval
  t: number | null
  /** Two-sided. */
  p: number | null
  found: 'bias' | 'no bias shown' | 'not enough data to tell'
  /** Bias beside twice the standard uncertainty of the reference; null where that isn't given. */
  withinReference: boolean | null
  reason: string | null
}

/**
 * Bias of an instrument: mean difference from the reference with its t interval.
 * Source: AIAG Measurement Systems Analysis, 4th edition, chapter III-B; NIST/SEMATECH e-Handbook 2.4.5.5 (both from memory).
 * @param differences reading minus reference
 * @param referenceUncertainty standard uncertainty of the reference, same unit
 * @throws RangeError on NaN or infinity or a wrong argument.
 */
export function biasOf(differences: readonly number[], confidence: number, referenceUncertainty?: number): Bias {
  requireAllFinite(differences, 'differences')
  requireOpenUnit(confidence, 'confidence')
  if (referenceUncertainty !== undefined) requireNotNegative(referenceUncertainty, 'referenceUncertainty')
  const summary = summarise(differences)
  const standardDeviation = standardDeviationOf(summary)
  const withinReference = summary.mean === null || referenceUncertainty === undefined
    ? null
    : Math.abs(summary.mean) <= 2 * referenceUncertainty
  const base = { n: summary.n, bias: summary.mean, standardDeviation, withinReference }
  if (summary.mean === null || standardDeviation === null) {
    const reason = 'needs at least two readings'
    return { ...base, interval: noInterval(reason), t: null, p: null, found: 'not enough data to tell', reason }
  }
  const sample = { n: summary.n, mean: summary.mean, standardDeviation }
  const test = oneSampleT(sample, 0)
  return {
    ...base,
    interval: meanInterval(sample, confidence),
    t: test.t,
    p: test.p,
    found: test.p === null ? 'not enough data to tell' : test.p <= 1 - confidence ? 'bias' : 'no bias shown',
    reason: test.reason,
  }
}

export interface BiasOverRuns {
  runs: Bias[]
  /** True when biases of both signs were found: then it drifts, and no one correction will do. */
  signTurns: boolean
}

/** Bias of each of several runs; a sign that turns between runs is drift, not bias (e-Handbook 2.4.5.5, from memory). */
export function biasOverRuns(runs: readonly (readonly number[])[], confidence: number): BiasOverRuns {
  const results = runs.map(run => biasOf(run, confidence))
  const found = results.filter(result => result.found === 'bias')
  return { runs: results, signTurns: found.some(result => result.bias! > 0) && found.some(result => result.bias! < 0) }
}

export interface Drift {
  n: number
  /** Change per unit of time. */
  slope: number | null
  interval: Interval
  p: number | null
  found: 'drift' | 'no drift shown' | 'not enough data to tell'
  reason: string | null
}

/**
 * Drift of check standard results over time: slope of the straight line with its t interval.
 * Source: NIST/SEMATECH e-Handbook 4.4.3 (from memory).
 * @param times in any one unit
 * @throws RangeError on NaN or infinity, lists of different length or a wrong confidence.
 */
export function driftOf(times: readonly number[], values: readonly number[], confidence: number): Drift {
  requireSameLength(times, 'times', values, 'values')
  requireAllFinite(times, 'times')
  requireAllFinite(values, 'values')
  requireOpenUnit(confidence, 'confidence')
  const line = straightLine(times, values)
  if (line.slope === null || line.slopeP === null) {
    const reason = line.reason ?? 'no line'
    return { n: line.n, slope: line.slope, interval: noInterval(reason), p: null, found: 'not enough data to tell', reason }
  }
  const half = tQuantile(1 - (1 - confidence) / 2, line.df) * line.slopeStandardError!
  return {
    n: line.n,
    slope: line.slope,
    interval: interval(line.slope - half, line.slope + half),
    p: line.slopeP,
    found: line.slopeP <= 1 - confidence ? 'drift' : 'no drift shown',
    reason: null,
  }
}
