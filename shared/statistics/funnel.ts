import { betaCdf } from './distributions'
import { requireOpenUnit, requireUnit, requireWhole } from './guards'
import { type Interval, interval, noInterval } from './interval'

/** P(R <= r) of a binomial count. */
function binomialCdf(r: number, n: number, share: number): number {
  if (r < 0) return 0
  if (r >= n) return 1
  return betaCdf(1 - share, n - r, r + 1)
}

/**
 * Lower limit as a share of n: the smallest count r with P(R <= r) >= tail, taken back by the part (P(R <= r) - tail)/P(R = r).
 * A whole count lies below it exactly when P(R <= count) < tail.
 */
function lowerLimit(tail: number, n: number, share: number): number {
  let below = -1
  let reached = n
  while (reached - below > 1) {
    const middle = Math.floor((below + reached) / 2)
    if (binomialCdf(middle, n, share) >= tail) reached = middle
    else below = middle
  }
  const at = binomialCdf(reached, n, share)
  const before = binomialCdf(reached - 1, n, share)
  return Math.max(0, (reached - (at - tail) / (at - before)) / n)
}

/**
 * Limits of a funnel plot for a share: where a group of n lies with the given coverage if only chance parts it from the centre.
 * Exact binomial limits, interpolated so that they run smoothly with n; the upper one is the lower one of those without the
 * property, so that a group lies outside exactly when its exact tail probability is below the tail.
 * Source: Spiegelhalter 2005, Statistics in Medicine 24, 1185, appendix A.1.1 (from memory); usual coverages 0.95 and 0.998.
 * @param centre share over all groups
 * @throws RangeError unless 0 <= centre <= 1, n is whole and 0 < coverage < 1.
 */
export function funnelLimits(centre: number, n: number, coverage: number): Interval {
  requireUnit(centre, 'centre')
  requireWhole(n, 'n', 0)
  requireOpenUnit(coverage, 'coverage')
  if (n === 0) return noInterval('the group is empty')
  if (centre === 0 || centre === 1) return noInterval(centre === 0 ? 'none in any group' : 'all in every group')
  const tail = (1 - coverage) / 2
  return interval(lowerLimit(tail, n, centre), 1 - lowerLimit(tail, n, 1 - centre))
}

export interface FunnelGroup {
  name: string
  /** How many of n have the property. */
  x: number
  n: number
}

export type FunnelPlace = 'inside' | 'outside 95 %' | 'outside 99.8 %' | 'not enough data to tell'

export interface FunnelPoint extends FunnelGroup {
  share: number | null
  limits95: Interval
  limits998: Interval
  place: FunnelPlace
  side: 'above' | 'below' | null
}

export interface FunnelPlot {
  centre: number | null
  points: FunnelPoint[]
  reason: string | null
}

function placeOf(share: number | null, limits95: Interval, limits998: Interval): FunnelPlace {
  const outside = (limits: Interval): boolean => limits.lower !== null && share !== null && (share < limits.lower || share > limits.upper)
  if (share === null || limits95.lower === null) return 'not enough data to tell'
  return outside(limits998) ? 'outside 99.8 %' : outside(limits95) ? 'outside 95 %' : 'inside'
}

/**
 * Funnel plot of shares of groups of different size (shops, technicians, lots) around their common share.
 * One in twenty lies outside the inner limits by chance alone. Count vehicles, not readings.
 * @throws RangeError unless the counts are whole and fit.
 */
export function funnelPlot(groups: readonly FunnelGroup[]): FunnelPlot {
  groups.forEach(({ x, n }, i) => {
    requireWhole(n, `groups[${i}].n`, 0)
    requireWhole(x, `groups[${i}].x`, 0, n)
  })
  const total = groups.reduce((sum, group) => sum + group.n, 0)
  const centre = total === 0 ? null : groups.reduce((sum, group) => sum + group.x, 0) / total
  const points = groups.map((group): FunnelPoint => {
    const share = group.n === 0 ? null : group.x / group.n
    const limits95 = centre === null ? noInterval('no values') : funnelLimits(centre, group.n, 0.95)
    const limits998 = centre === null ? noInterval('no values') : funnelLimits(centre, group.n, 0.998)
    const place = placeOf(share, limits95, limits998)
    const side = place === 'outside 95 %' || place === 'outside 99.8 %' ? (share! > centre! ? 'above' : 'below') : null
    return { ...group, share, limits95, limits998, place, side }
  })
  const reason = centre === null ? 'no values' : centre === 0 ? 'none in any group' : centre === 1 ? 'all in every group' : null
  return { centre, points, reason }
}
