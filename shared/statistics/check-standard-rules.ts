import { requireSeries, type Series } from './chart-series'

/** Rules for results of a check standard by their usual names. */
export const CHECK_STANDARD_RULES = ['1_2s', '1_3s', '2_2s', 'R_4s', '4_1s', '10_x'] as const
export type CheckStandardRule = (typeof CHECK_STANDARD_RULES)[number]

export interface CheckStandardSignal {
  rule: CheckStandardRule
  /** A warning asks to look at the other rules; a rejection stops the instrument. */
  kind: 'warning' | 'rejection'
  /** Position (from 0) of the result that completes the pattern. */
  at: number
}

function lastAll(z: readonly number[], length: number, fits: (value: number) => boolean): boolean {
  return z.length >= length && z.slice(-length).every(fits)
}

function sameSide(z: readonly number[], length: number, limit: number): boolean {
  return lastAll(z, length, value => value > limit) || lastAll(z, length, value => value < -limit)
}

function opposed(z: readonly number[]): boolean {
  const [before, now] = z.slice(-2)
  if (before === undefined || now === undefined) return false
  return (before > 2 && now < -2) || (before < -2 && now > 2)
}

const COMPLETES: Record<CheckStandardRule, (z: readonly number[]) => boolean> = {
  '1_2s': z => lastAll(z, 1, value => Math.abs(value) > 2),
  '1_3s': z => lastAll(z, 1, value => Math.abs(value) > 3),
  '2_2s': z => sameSide(z, 2, 2),
  'R_4s': opposed,
  '4_1s': z => sameSide(z, 4, 1),
  '10_x': z => sameSide(z, 10, 0),
}

/**
 * Rules on z = (value - assigned value)/fixed standard deviation of check standard results in order of time: not from the
 * data being judged. R_4s is taken only between neighbours in time; a missing result (null) ends every pattern.
 * Source: Westgard, Barry, Hunt and Groth 1981, Clinical Chemistry 27, 493 (from memory).
 * @throws RangeError on NaN or infinity.
 */
export function checkStandardSignals(z: Series): CheckStandardSignal[] {
  requireSeries(z, 'z')
  const signals: CheckStandardSignal[] = []
  let stretch: number[] = []
  z.forEach((value, at) => {
    if (value === null) {
      stretch = []
      return
    }
    stretch.push(value)
    for (const rule of CHECK_STANDARD_RULES) {
      if (COMPLETES[rule](stretch)) signals.push({ rule, kind: rule === '1_2s' ? 'warning' : 'rejection', at })
    }
  })
  return signals
}
