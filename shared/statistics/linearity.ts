import { summarise } from './describe'
import { requireAllFinite, requireSameLength } from './guards'
import { lackOfFit, straightLine, type LackOfFit, type StraightLineResult } from './regression'

export interface LinearityLevel {
  reference: number
  n: number
  meanBias: number | null
}

export interface Linearity {
  levels: LinearityLevel[]
  /** Straight line of bias on reference: slope and intercept are tested against 0. null below three levels. */
  line: StraightLineResult | null
  /** Whether a straight line is enough at all; R² can't tell. null below three levels. */
  lackOfFit: LackOfFit | null
  reason: string | null
}

/**
 * Linearity: regression of bias (reading minus reference) on the reference.
 * Source: AIAG Measurement Systems Analysis, 4th edition, chapter III-B; lack of fit: NIST/SEMATECH e-Handbook 4.4.4.6 (both from memory).
 * @param reference value of each level
 * @param readings readings[level], in the units of the reference
 * @throws RangeError on NaN or infinity or lists of different length.
 */
export function linearity(reference: readonly number[], readings: readonly (readonly number[])[]): Linearity {
  requireAllFinite(reference, 'reference')
  requireSameLength(reference, 'reference', readings, 'readings')
  readings.forEach((level, i) => requireAllFinite(level, `readings[${i}]`))
  return linearityOfBias(reference, readings.map((level, i) => level.map(reading => reading - reference[i]!)))
}

/**
 * The same from biases, bias[level].
 * @throws RangeError on NaN or infinity or lists of different length.
 */
export function linearityOfBias(reference: readonly number[], bias: readonly (readonly number[])[]): Linearity {
  requireAllFinite(reference, 'reference')
  requireSameLength(reference, 'reference', bias, 'bias')
  bias.forEach((level, i) => requireAllFinite(level, `bias[${i}]`))
  const levels = reference.map((value, i) => ({ reference: value, n: bias[i]!.length, meanBias: summarise(bias[i]!).mean }))
  const measured = new Set(reference.filter((_, i) => bias[i]!.length > 0)).size
  if (measured < 3) return { levels, line: null, lackOfFit: null, reason: 'fewer than three levels say nothing about linearity' }
  const x = reference.flatMap((value, i) => bias[i]!.map(() => value))
  const y = bias.flat()
  return { levels, line: straightLine(x, y), lackOfFit: lackOfFit(x, y), reason: null }
}
