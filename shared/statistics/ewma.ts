import { requireFinite, requirePositive } from './guards'
import { chartPoint, requireSeries, type ChartPoint, type Series } from './chart-series'

export interface EwmaSettings {
  /** Weight of the newest value, above 0 and up to 1. */
  lambda: number
  target: number
  /** Standard deviation of a single value. */
  sigma: number
  /** Half width of the limits in standard deviations of the average. λ 0.2 with 2.962 gives a false alarm in about 500. */
  width: number
}

export interface EwmaPoint extends ChartPoint {
  /** The running average; held over a missing value. */
  ewma: number
  halfWidth: number
}

export interface EwmaChart {
  points: EwmaPoint[]
  /** The limits that the widening ones approach. */
  asymptoticLower: number
  asymptoticUpper: number
}

/**
 * Exponentially weighted moving average with limits that widen with time:
 * z_i = λ x_i + (1 - λ) z_{i-1} from the target, half width L σ √(λ/(2 - λ) (1 - (1 - λ)^{2i})).
 * A missing value holds z and doesn't count in i. Restart the series at the target after a settled signal.
 * `beyond` and the limits are those of the average, `value` is the reading.
 * Source: NIST/SEMATECH e-Handbook 6.3.2.4; ISO 7870-6.
 * @throws RangeError on NaN or infinity or a wrong setting.
 */
export function ewmaChart(series: Series, settings: EwmaSettings): EwmaChart {
  requireSeries(series, 'series')
  const { lambda, target, sigma, width } = settings
  if (!(lambda > 0 && lambda <= 1)) throw new RangeError(`lambda must lie above 0 and up to 1, not ${lambda}`)
  requireFinite(target, 'target')
  requirePositive(sigma, 'sigma')
  requirePositive(width, 'width')
  const asymptotic = width * sigma * Math.sqrt(lambda / (2 - lambda))
  let average = target
  let seen = 0
  const points = series.map((value): EwmaPoint => {
    if (value !== null) {
      average = lambda * value + (1 - lambda) * average
      seen += 1
    }
    const halfWidth = asymptotic * Math.sqrt(1 - (1 - lambda) ** (2 * seen))
    const { lower, upper, beyond } = chartPoint(value === null ? null : average, target - halfWidth, target + halfWidth)
    return { value, ewma: average, halfWidth, lower, upper, beyond }
  })
  return { points, asymptoticLower: target - asymptotic, asymptoticUpper: target + asymptotic }
}
