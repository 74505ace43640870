import { chartPoint, requireSeries, type ChartPoint, type Series } from './chart-series'
import { controlConstants } from './control-constants'
import { exactSum, pairMean } from './exact-sum'
import { requirePositive } from './guards'

export interface IndividualsSettings {
  /** Mean range of two normal values in units of σ; 2/√π unless the rounded 1.128 of a printed table is wanted. */
  d2?: number
  /** Positions (from 0) of the first values after a filter change, a new lot, a gap: no moving range across them. */
  breaks?: readonly number[]
  /** Step of the display, in the units of the values. */
  resolution?: number
}

export interface IndividualsChart {
  centre: number | null
  /** Moving range mean over d2. */
  sigma: number | null
  meanMovingRange: number | null
  lower: number | null
  upper: number | null
  /** Upper limit of the moving ranges, D4 of two values times their mean. */
  movingRangeUpper: number | null
  points: ChartPoint[]
  /** Moving range that ends at each value; null where there is none. */
  movingRanges: ChartPoint[]
  cautions: string[]
  reason: string | null
}

/** Mean of the moving ranges of a series, and the ranges themselves; a missing value never joins its neighbours. */
export function movingRanges(series: Series, breaks: readonly number[] = []): (number | null)[] {
  requireSeries(series, 'series')
  const starts = new Set(breaks)
  return series.map((value, i) => {
    const before = i === 0 || starts.has(i) ? null : series[i - 1]!
    return value === null || before === null ? null : Math.abs(value - before)
  })
}

/**
 * Individuals and moving range chart: centre m, limits ±3 · mean moving range / d2, moving ranges up to D4(2) times their mean.
 * Source: NIST/SEMATECH e-Handbook 6.3.2.2.
 * @throws RangeError on NaN or infinity or a wrong setting.
 */
export function individualsChart(series: Series, settings: IndividualsSettings = {}): IndividualsChart {
  const values = requireSeries(series, 'series')
  const d2 = settings.d2 ?? 2 / Math.sqrt(Math.PI)
  requirePositive(d2, 'd2')
  if (settings.resolution !== undefined) requirePositive(settings.resolution, 'resolution')
  const ranges = movingRanges(series, settings.breaks)
  const known = ranges.filter(range => range !== null)
  const centre = values.length === 0 ? null : pairMean(values).high
  if (centre === null || known.length === 0) {
    const point = (value: number | null): ChartPoint => ({ value, lower: null, upper: null, beyond: false })
    return {
      centre, sigma: null, meanMovingRange: null, lower: null, upper: null, movingRangeUpper: null,
      points: series.map(point), movingRanges: ranges.map(point), cautions: [], reason: 'needs two neighbouring values',
    }
  }
  const meanRange = exactSum(known) / known.length
  const sigma = meanRange / d2
  const lower = centre - 3 * sigma
  const upper = centre + 3 * sigma
  const movingRangeUpper = controlConstants(2).D4 * meanRange
  const cautions: string[] = []
  if (values.length < 20) cautions.push('fewer than twenty values: the limits are provisional')
  const zeros = known.filter(range => range === 0).length
  // Half of the ranges or a step above one sigma: common practice, no source.
  if (zeros * 2 > known.length || (settings.resolution !== undefined && settings.resolution > sigma)) {
    cautions.push('the display step is coarse beside the spread: the limits are too narrow')
  }
  return {
    centre, sigma, meanMovingRange: meanRange, lower, upper, movingRangeUpper,
    points: series.map(value => chartPoint(value, lower, upper)),
    movingRanges: ranges.map(range => chartPoint(range, 0, movingRangeUpper)),
    cautions,
    reason: meanRange === 0 ? 'all neighbouring values are equal: no spread to set limits by' : null,
  }
}
