import { requirePositive, requireSameLength, requireWhole } from './guards'
import { chartPoint, type ChartPoint } from './chart-series'

export interface ShareChart {
  /** Share over all groups. */
  centre: number | null
  /** One per group with its own limits; a group of 0 is a gap. */
  points: ChartPoint[]
  /** Laney's factor on the width of the limits; 1 on a plain p chart, null where there is none. */
  sigmaZ: number | null
  cautions: string[]
  reason: string | null
}

function requireCounts(counts: readonly number[], sizes: readonly number[]): void {
  requireSameLength(counts, 'counts', sizes, 'sizes')
  sizes.forEach((size, i) => {
    requireWhole(size, `sizes[${i}]`, 0)
    requireWhole(counts[i]!, `counts[${i}]`, 0, size)
  })
}

function refuse(counts: readonly number[], sizes: readonly number[], centre: number | null, reason: string): ShareChart {
  return {
    centre,
    points: counts.map((count, i) => ({ value: sizes[i]! > 0 ? count / sizes[i]! : null, lower: null, upper: null, beyond: false })),
    sigmaZ: null,
    cautions: [],
    reason,
  }
}

function shareChart(counts: readonly number[], sizes: readonly number[], factorOf: (z: number[]) => number | null): ShareChart {
  requireCounts(counts, sizes)
  const total = sizes.reduce((sum, size) => sum + size, 0)
  if (total === 0) return refuse(counts, sizes, null, 'no values')
  const centre = counts.reduce((sum, count) => sum + count, 0) / total
  if (centre === 0) return refuse(counts, sizes, centre, 'none in any group: no chart')
  if (centre === 1) return refuse(counts, sizes, centre, 'all in every group: no chart')
  const sigmas = sizes.map(size => size === 0 ? null : Math.sqrt(centre * (1 - centre) / size))
  const z = counts.flatMap((count, i) => sigmas[i] === null ? [] : [(count / sizes[i]! - centre) / sigmas[i]!])
  const sigmaZ = factorOf(z)
  if (sigmaZ === null) return refuse(counts, sizes, centre, 'needs at least two groups in order of time')
  const cautions: string[] = []
  if (sizes.some(size => size > 0 && size * Math.min(centre, 1 - centre) < 5)) {
    cautions.push('fewer than five expected in a group: the limits mean little')
  }
  if (sigmaZ < 1) cautions.push('the shares vary less than chance alone: the limits are narrower than on a p chart')
  return {
    centre,
    points: counts.map((count, i) => {
      const sigma = sigmas[i]
      if (sigma === null || sigma === undefined) return { value: null, lower: null, upper: null, beyond: false }
      const half = 3 * sigma * sigmaZ
      return chartPoint(count / sizes[i]!, Math.max(0, centre - half), Math.min(1, centre + half))
    }),
    sigmaZ,
    cautions,
    reason: null,
  }
}

/**
 * p chart, p̄ ± 3 √(p̄(1 - p̄)/n_i), cut at 0 and 1. With p̄ of 0 or 1 there is no chart.
 * Source: NIST/SEMATECH e-Handbook 6.3.3.2.
 * @param counts how many of each group have the property
 * @param sizes of the groups
 * @throws RangeError unless the counts are whole and fit their groups.
 */
export function shareControlChart(counts: readonly number[], sizes: readonly number[]): ShareChart {
  return shareChart(counts, sizes, () => 1)
}

/**
 * Laney's p′ chart: the limits are widened (or narrowed, which is shown) by the spread of the standardised shares in time,
 * σ_z = mean |z_i - z_{i-1}| / d2.
 * Source: Laney 2002, Quality Engineering 14, 531 (from memory).
 * @param d2 2/√π unless the rounded 1.128 of a printed table is wanted
 * @throws RangeError unless the counts are whole and fit their groups, and d2 > 0.
 */
export function laneyShareControlChart(counts: readonly number[], sizes: readonly number[], d2 = 2 / Math.sqrt(Math.PI)): ShareChart {
  requirePositive(d2, 'd2')
  return shareChart(counts, sizes, (z) => {
    if (z.length < 2) return null
    let sum = 0
    for (let i = 1; i < z.length; i += 1) sum += Math.abs(z[i]! - z[i - 1]!)
    return sum / (z.length - 1) / d2
  })
}

export interface CountChart {
  centre: number | null
  lower: number | null
  upper: number | null
  points: ChartPoint[]
  reason: string | null
}

/**
 * Counts chart over equal chances, c̄ ± 3 √c̄, cut at 0. A point on the limit isn't beyond it.
 * Source: NIST/SEMATECH e-Handbook 6.3.3.1 (from memory).
 * @throws RangeError unless the counts are whole.
 */
export function countControlChart(counts: readonly number[]): CountChart {
  counts.forEach((count, i) => requireWhole(count, `counts[${i}]`, 0))
  const total = counts.reduce((sum, count) => sum + count, 0)
  if (total === 0) {
    return {
      centre: counts.length === 0 ? null : 0, lower: null, upper: null,
      points: counts.map(value => ({ value, lower: null, upper: null, beyond: false })),
      reason: counts.length === 0 ? 'no values' : 'none counted: no chart',
    }
  }
  const centre = total / counts.length
  const half = 3 * Math.sqrt(centre)
  const lower = Math.max(0, centre - half)
  const upper = centre + half
  return { centre, lower, upper, points: counts.map(value => chartPoint(value, lower, upper)), reason: null }
}
