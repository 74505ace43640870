import { summarise, standardDeviationOf } from './describe'
import { tQuantile } from './distributions'
import { requireAllFinite, requireOpenUnit, requireWhole } from './guards'

/*
 * Outliers are marked, never removed silently: figures are shown with and without them.
 * A true contamination is the finding, not an outlier.
 */

export type GrubbsSide = 'max' | 'min' | 'two-sided'

export interface Grubbs {
  /** Distance of the suspect from the mean in standard deviations. */
  g: number | null
  critical: number | null
  /** Position of the suspect in `values`, counted from 0. */
  suspect: number | null
  outlier: boolean
  /** Why it is not defined, or what to bear in mind. */
  reason: string | null
}

/** (n - 1)/√n √(t²/(n - 2 + t²)) for a tail share of the t distribution. */
function grubbsCritical(n: number, tail: number): number {
  const t = tQuantile(tail, n - 2)
  return (n - 1) / Math.sqrt(n) * Math.sqrt(t * t / (n - 2 + t * t))
}

/**
 * Grubbs' test for one outlier. Two outliers hide each other: use `generalizedEsd` for more than one.
 * Source: NIST/SEMATECH e-Handbook 1.3.5.17.1 (from memory).
 * @param side `max` or `min` asks about that end (t at α/n), `two-sided` about either (t at α/(2n))
 * @throws RangeError on NaN or infinity or a wrong alpha.
 */
export function grubbs(values: readonly number[], alpha: number, side: GrubbsSide): Grubbs {
  requireOpenUnit(alpha, 'alpha')
  const summary = summarise(values)
  const n = summary.n
  if (n < 3) return { g: null, critical: null, suspect: null, outlier: false, reason: 'needs at least three values' }
  const s = standardDeviationOf(summary)!
  if (s === 0) return { g: null, critical: null, suspect: null, outlier: false, reason: 'all values are equal' }
  let suspect = 0
  let farthest = -Infinity
  values.forEach((value, i) => {
    const distance = value - summary.mean!
    const size = side === 'max' ? distance : side === 'min' ? -distance : Math.abs(distance)
    if (size > farthest) {
      farthest = size
      suspect = i
    }
  })
  const g = farthest / s
  const critical = grubbsCritical(n, alpha / (side === 'two-sided' ? 2 * n : n))
  return { g, critical, suspect, outlier: g > critical, reason: n <= 6 ? 'with six values or fewer little is found' : null }
}

export interface EsdStep {
  /** Position of the removed value in `values`, counted from 0. */
  at: number
  value: number
  /** R_i. */
  statistic: number
  /** λ_i. */
  critical: number
}

export interface GeneralizedEsd {
  steps: EsdStep[]
  /** The largest i with R_i > λ_i, not the first failure. */
  count: number
  /** Positions of the outliers in `values`, counted from 0, in the order of removal. */
  outliers: number[]
  reason: string | null
}

/**
 * Generalized extreme studentized deviate test for up to `most` outliers; of ties only one is removed at a time.
 * Source: Rosner 1983, Technometrics 25, 165; NIST/SEMATECH e-Handbook 1.3.5.17.3 (both from memory).
 * @param most largest number of outliers to look for; cut to n - 2
 * @throws RangeError on NaN or infinity, a wrong alpha or `most`.
 */
export function generalizedEsd(values: readonly number[], most: number, alpha: number): GeneralizedEsd {
  requireAllFinite(values, 'values')
  requireWhole(most, 'most', 1)
  requireOpenUnit(alpha, 'alpha')
  const n = values.length
  if (n < 3) return { steps: [], count: 0, outliers: [], reason: 'needs at least three values' }
  const kept = values.map((_, i) => i)
  const steps: EsdStep[] = []
  let ranOutOfSpread = false
  for (let i = 1; i <= Math.min(most, n - 2); i += 1) {
    const summary = summarise(kept.map(at => values[at]!))
    const s = standardDeviationOf(summary)!
    if (s === 0) {
      ranOutOfSpread = true
      break
    }
    let place = 0
    kept.forEach((at, j) => {
      if (Math.abs(values[at]! - summary.mean!) > Math.abs(values[kept[place]!]! - summary.mean!)) place = j
    })
    const at = kept[place]!
    const t = tQuantile(alpha / (2 * (n - i + 1)), n - i - 1)
    steps.push({
      at,
      value: values[at]!,
      statistic: Math.abs(values[at]! - summary.mean!) / s,
      critical: (n - i) * -t / Math.sqrt((n - i - 1 + t * t) * (n - i + 1)),
    })
    kept.splice(place, 1)
  }
  let count = 0
  steps.forEach((step, i) => {
    if (step.statistic > step.critical) count = i + 1
  })
  const reason = steps.length === 0
    ? 'all values are equal'
    : ranOutOfSpread
      ? 'the remaining values are all equal'
      : n < 15
        ? 'below fifteen values the stated level does not hold'
        : n < 25 ? 'below twenty-five values the stated level holds only roughly' : null
  return { steps, count, outliers: steps.slice(0, count).map(step => step.at), reason }
}
