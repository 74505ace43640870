import { requireWhole } from './guards'
import { requireSeries, type Series } from './chart-series'

/** Nelson's numbers. */
export type RunRule = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8

export interface RunRuleSettings {
  rules: readonly RunRule[]
  /** Length of rule 2: 7, 8 or 9 by source; to be printed beside the chart. */
  sameSideLength: number
}

/** Nelson 1984, J. Quality Technology 16, 237 (from memory): all eight, nine on one side. */
export const NELSON_RULES: RunRuleSettings = { rules: [1, 2, 3, 4, 5, 6, 7, 8], sameSideLength: 9 }

/**
 * Western Electric 1956, eight on one side (NIST/SEMATECH e-Handbook 6.3.2, from memory).
 * Together a false alarm in about 92 points (Champ and Woodall 1987, Technometrics 29, 393, from memory).
 */
export const WESTERN_ELECTRIC_RULES: RunRuleSettings = { rules: [1, 2, 5, 6], sameSideLength: 8 }

/** What each rule asks for, with the length of rule 2 that is in use. */
export function runRuleWords(rule: RunRule, sameSideLength: number): string {
  switch (rule) {
    case 1: return 'one point beyond 3 standard deviations'
    case 2: return `${sameSideLength} points in a row on one side of the centre`
    case 3: return 'six points in a row rising or falling'
    case 4: return 'fourteen points in a row going up and down in turn'
    case 5: return 'two of three points beyond 2 standard deviations on one side'
    case 6: return 'four of five points beyond 1 standard deviation on one side'
    case 7: return 'fifteen points in a row within 1 standard deviation'
    case 8: return 'eight points in a row beyond 1 standard deviation on either side'
  }
}

export interface RunSignal {
  rule: RunRule
  /** Position (from 0) of the point that completes the pattern. */
  at: number
  /** Position of the first point of the pattern. */
  from: number
}

/** Rule k of m: the point itself counts and at least `needed` of the last `window` points do. */
function amongLast(z: readonly number[], i: number, counts: (value: number) => boolean, needed: number, window: number): number | null {
  if (!counts(z[i]!)) return null
  let found = 0
  for (let j = i; j >= 0 && j > i - window; j -= 1) {
    if (counts(z[j]!)) found += 1
    if (found === needed) return j
  }
  return null
}

/** Position of the first of the `length` points up to i that all count, or null. */
function allOfLast(z: readonly number[], i: number, counts: (value: number) => boolean, length: number): number | null {
  return amongLast(z, i, counts, length, length)
}

/** Same, for steps between neighbours: `length` points have one step fewer. */
function stepsOfLast(i: number, fits: (j: number) => boolean, length: number): number | null {
  const first = i - length + 1
  if (first < 0) return null
  for (let j = first + 1; j <= i; j += 1) {
    if (!fits(j)) return null
  }
  return first
}

const above = (limit: number) => (value: number): boolean => value > limit
const below = (limit: number) => (value: number): boolean => value < limit

function completes(rule: RunRule, z: readonly number[], i: number, sameSideLength: number): number | null {
  switch (rule) {
    case 1: return Math.abs(z[i]!) > 3 ? i : null
    case 2: return allOfLast(z, i, above(0), sameSideLength) ?? allOfLast(z, i, below(0), sameSideLength)
    case 3: return stepsOfLast(i, j => z[j]! > z[j - 1]!, 6) ?? stepsOfLast(i, j => z[j]! < z[j - 1]!, 6)
    case 4: {
      const turns = (up: boolean) => (j: number): boolean => ((i - j) % 2 === 0) === up ? z[j]! > z[j - 1]! : z[j]! < z[j - 1]!
      return stepsOfLast(i, turns(true), 14) ?? stepsOfLast(i, turns(false), 14)
    }
    case 5: return amongLast(z, i, above(2), 2, 3) ?? amongLast(z, i, below(-2), 2, 3)
    case 6: return amongLast(z, i, above(1), 4, 5) ?? amongLast(z, i, below(-1), 4, 5)
    case 7: return allOfLast(z, i, value => Math.abs(value) <= 1, 15)
    case 8: return allOfLast(z, i, value => Math.abs(value) > 1, 8)
  }
}

/**
 * Run rules on standardised values, (value - centre)/σ, of one chart phase in order of time.
 * A value on the centre line is on neither side; a tie ends a trend; a value on a zone line isn't beyond it;
 * a missing value (null) ends every pattern.
 * Source: Nelson 1984; ISO 7870-2:2013 leaves the choice of rules open (both from memory).
 * @returns every point that completes a pattern, in order of time and then of rule
 * @throws RangeError on NaN or infinity, or a same-side length below 2.
 */
export function runRuleSignals(z: Series, settings: RunRuleSettings): RunSignal[] {
  requireSeries(z, 'z')
  requireWhole(settings.sameSideLength, 'sameSideLength', 2)
  const rules = [...settings.rules].sort((a, b) => a - b)
  const signals: RunSignal[] = []
  let start = 0
  let stretch: number[] = []
  z.forEach((value, at) => {
    if (value === null) {
      stretch = []
      start = at + 1
      return
    }
    stretch.push(value)
    for (const rule of rules) {
      const from = completes(rule, stretch, stretch.length - 1, settings.sameSideLength)
      if (from !== null) signals.push({ rule, at, from: start + from })
    }
  })
  return signals
}
