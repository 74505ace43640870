import { c4, controlConstants } from './control-constants'
import { summarise } from './describe'
import { requireAllFinite } from './guards'
import { chartPoint, type ChartPoint } from './chart-series'

/** Ranges waste too much of larger subgroups: NIST/SEMATECH e-Handbook 6.3.2.1 (from memory). */
export const LARGEST_SUBGROUP_FOR_RANGE = 10

export interface SubgroupChart {
  /** Mean of all values; of equally large subgroups also the mean of their means. */
  centre: number | null
  /** Estimated within-subgroup standard deviation. */
  sigma: number | null
  /** Mean range, mean standard deviation, or with unequal sizes the pooled one (see `spread`). */
  meanSpread: number | null
  spread: 'range' | 'standard deviation' | 'pooled standard deviation'
  /** One per subgroup, the limits of its size. */
  means: ChartPoint[]
  spreads: ChartPoint[]
  reason: string | null
}

function refuse(spread: SubgroupChart['spread'], reason: string): SubgroupChart {
  return { centre: null, sigma: null, meanSpread: null, spread, means: [], spreads: [], reason }
}

function requireSubgroups(subgroups: readonly (readonly number[])[]): void {
  subgroups.forEach((group, i) => requireAllFinite(group, `subgroups[${i}]`))
}

/**
 * X-bar and R chart, m ± A2 R̄ and D3 R̄ to D4 R̄, for subgroups of one size from 2 to 10.
 * Source: NIST/SEMATECH e-Handbook 6.3.2.1; ISO 7870-2 (from memory).
 * @throws RangeError on NaN or infinity.
 */
export function xbarRangeChart(subgroups: readonly (readonly number[])[]): SubgroupChart {
  requireSubgroups(subgroups)
  if (subgroups.length < 2) return refuse('range', 'needs at least two subgroups')
  const n = subgroups[0]!.length
  if (subgroups.some(group => group.length !== n)) return refuse('range', 'subgroups of unequal size: use the chart with standard deviations')
  if (n < 2) return refuse('range', 'subgroups need at least two values')
  if (n > LARGEST_SUBGROUP_FOR_RANGE) return refuse('range', 'more than ten values in a subgroup: use the chart with standard deviations')
  const means = subgroups.map(group => summarise(group).mean!)
  const ranges = subgroups.map(group => Math.max(...group) - Math.min(...group))
  const centre = summarise(means).mean!
  const meanRange = summarise(ranges).mean!
  const { A2, D3, D4, d2 } = controlConstants(n)
  return {
    centre,
    sigma: meanRange / d2,
    meanSpread: meanRange,
    spread: 'range',
    means: means.map(mean => chartPoint(mean, centre - A2 * meanRange, centre + A2 * meanRange)),
    spreads: ranges.map(range => chartPoint(range, D3 * meanRange, D4 * meanRange)),
    reason: meanRange === 0 ? 'no spread within the subgroups' : null,
  }
}

/**
 * X-bar and S chart. Equal sizes: m ± A3 s̄ and B3 s̄ to B4 s̄. Unequal sizes: the centre weighs every value alike and the limits
 * of each subgroup follow from the pooled standard deviation σ, m ± 3σ/√n_i and σ (c4 ± 3 √(1 - c4²)).
 * Source: NIST/SEMATECH e-Handbook 6.3.2.1; ASTM E2587 (from memory).
 * @throws RangeError on NaN or infinity.
 */
export function xbarStandardDeviationChart(subgroups: readonly (readonly number[])[]): SubgroupChart {
  requireSubgroups(subgroups)
  if (subgroups.length < 2) return refuse('standard deviation', 'needs at least two subgroups')
  if (subgroups.some(group => group.length === 0)) return refuse('standard deviation', 'a subgroup is empty')
  const equal = subgroups.every(group => group.length === subgroups[0]!.length)
  const spread = equal ? 'standard deviation' : 'pooled standard deviation'
  const parts = subgroups.map(summarise)
  const df = parts.reduce((sum, part) => sum + part.n - 1, 0)
  if (df === 0 || (equal && parts[0]!.n < 2)) return refuse(spread, 'subgroups need at least two values')
  const deviationsOf = parts.map(part => part.n < 2 ? null : Math.sqrt(part.m2 / (part.n - 1)))
  const pooled = Math.sqrt(parts.reduce((sum, part) => sum + part.m2, 0) / df)
  const meanSpread = equal ? summarise(deviationsOf as number[]).mean! : pooled
  // With equal sizes s̄/c4 is the unbiased estimate that A3, B3 and B4 are made for.
  const sigma = equal ? meanSpread / c4(parts[0]!.n) : pooled
  const centre = equal ? summarise(parts.map(part => part.mean!)).mean! : summarise(subgroups.flat()).mean!
  return {
    centre,
    sigma,
    meanSpread,
    spread,
    means: parts.map(part => chartPoint(part.mean, centre - 3 * sigma / Math.sqrt(part.n), centre + 3 * sigma / Math.sqrt(part.n))),
    spreads: parts.map((part, i) => {
      if (part.n < 2) return { value: null, lower: null, upper: null, beyond: false }
      const c = c4(part.n)
      const half = 3 * Math.sqrt(1 - c * c)
      return chartPoint(deviationsOf[i]!, Math.max(0, sigma * (c - half)), sigma * (c + half))
    }),
    reason: meanSpread === 0 ? 'no spread within the subgroups' : null,
  }
}
