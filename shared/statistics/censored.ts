import { incompleteGamma } from './gamma'
import { requireAllFinite, requirePositive, requireUnit } from './guards'
import { quantile, type QuantileType } from './quantiles'

/** Values of which some are only known to lie below a detection limit. */
export interface CensoredSample {
  /** Values that were seen. */
  observed: readonly number[]
  /** The limit of each value that was reported as "< limit"; each has a limit of its own. */
  below: readonly number[]
}

function requireSample(sample: CensoredSample): void {
  requireAllFinite(sample.observed, 'observed')
  requireAllFinite(sample.below, 'below')
}

/** ln Φ(z) and φ(z)/Φ(z); the asymptotic series below -8, where Φ itself loses its meaning for logarithms. */
function logNormalShare(z: number): { log: number, ratio: number } {
  const density = -z * z / 2 - 0.918938533204672741780329736406
  if (z < -8) {
    // Continued fraction of Mills' ratio, DLMF 7.9.3: Φ(z) = φ(z) / (|z| + 1/(|z| + 2/(|z| + ...))).
    let tail = -z
    for (let k = 40; k >= 1; k -= 1) tail = -z + k / tail
    return { log: density - Math.log(tail), ratio: tail }
  }
  const half = incompleteGamma(0.5, z * z / 2)
  const log = z <= 0 ? Math.log(half.upper / 2) : Math.log1p(-half.upper / 2)
  return { log, ratio: Math.exp(density - log) }
}

export interface CensoredFit {
  n: number
  /** How many lie below their limit. */
  below: number
  /** Maximum likelihood mean and standard deviation (divisor n where nothing is below); null where they can't be given. */
  mean: number | null
  standardDeviation: number | null
  /** Of the logarithms, only on that scale. */
  logMean: number | null
  logStandardDeviation: number | null
  /** Where no figure can be given: every value lies below this; else null. */
  allBelow: number | null
  reason: string | null
}

/** Fewer values above their limit than this, or a larger share below than `MOST_BELOW`, and no mean is given (Helsel 2012, chapter 6, from memory). */
export const FEWEST_OBSERVED = 3
export const MOST_BELOW = 0.8

/**
 * Maximum likelihood of a left-censored normal sample by Newton's method in 1/σ and μ/σ, in which the logarithm of the
 * likelihood is concave (Olsen 1978, Econometrica 46, 1211, from memory), so that it has one summit.
 */
function fit(observed: readonly number[], below: readonly number[]): { mean: number, sd: number } | null {
  const n = observed.length
  const centre = observed.reduce((sum, value) => sum + value, 0) / n
  const scale = Math.sqrt(observed.reduce((sum, value) => sum + (value - centre) ** 2, 0) / n)
    || Math.max(...below.map(limit => Math.abs(limit - centre)))
  if (!(scale > 0)) return null
  const x = observed.map(value => (value - centre) / scale)
  const limits = below.map(limit => (limit - centre) / scale)
  const likelihood = (theta: number, eta: number): number => {
    let sum = n * Math.log(theta)
    for (const value of x) sum -= (theta * value - eta) ** 2 / 2
    for (const limit of limits) sum += logNormalShare(theta * limit - eta).log
    return sum
  }
  let theta = 1
  let eta = 0
  let current = likelihood(theta, eta)
  for (let turn = 0; turn < 200; turn += 1) {
    let gradientTheta = n / theta
    let gradientEta = 0
    let thetaTheta = n / (theta * theta)
    let thetaEta = 0
    let etaEta = 0
    for (const value of x) {
      const r = theta * value - eta
      gradientTheta -= r * value
      gradientEta += r
      thetaTheta += value * value
      thetaEta -= value
      etaEta += 1
    }
    for (const limit of limits) {
      const z = theta * limit - eta
      const { ratio } = logNormalShare(z)
      const curvature = ratio * (ratio + z)
      gradientTheta += ratio * limit
      gradientEta -= ratio
      thetaTheta += curvature * limit * limit
      thetaEta -= curvature * limit
      etaEta += curvature
    }
    const determinant = thetaTheta * etaEta - thetaEta * thetaEta
    const stepTheta = (etaEta * gradientTheta - thetaEta * gradientEta) / determinant
    const stepEta = (thetaTheta * gradientEta - thetaEta * gradientTheta) / determinant
    let share = 1
    while (theta + share * stepTheta <= 0) share /= 2
    let next = likelihood(theta + share * stepTheta, eta + share * stepEta)
    while (next < current && share > 1e-10) {
      share /= 2
      next = likelihood(theta + share * stepTheta, eta + share * stepEta)
    }
    theta += share * stepTheta
    eta += share * stepEta
    current = next
    if (Math.abs(stepTheta) < 1e-13 * theta && Math.abs(stepEta) < 1e-13 * (1 + Math.abs(eta))) break
    if (theta > 1e8) return null
  }
  return { mean: centre + scale * eta / theta, sd: scale / theta }
}

/**
 * Mean and standard deviation of values of which some lie below their detection limits, by maximum likelihood;
 * on `logarithm` the values are taken as lognormal and the figures turned back.
 * None above: only the statement that all lie below the largest limit. Fewer than three above or more than
 * 80 % below: no mean, use the share above the limit.
 * Source: Cohen 1959, Technometrics 1, 217; Helsel 2012, Statistics for Censored Environmental Data (both from memory).
 * @throws RangeError on NaN or infinity, or on `logarithm` with a value or limit not above 0.
 */
export function censoredFit(sample: CensoredSample, scale: 'linear' | 'logarithm' = 'linear'): CensoredFit {
  requireSample(sample)
  if (scale === 'logarithm') {
    sample.observed.forEach((value, i) => requirePositive(value, `observed[${i}]`))
    sample.below.forEach((value, i) => requirePositive(value, `below[${i}]`))
  }
  const n = sample.observed.length + sample.below.length
  const below = sample.below.length
  const none = (reason: string, allBelow: number | null = null): CensoredFit =>
    ({ n, below, mean: null, standardDeviation: null, logMean: null, logStandardDeviation: null, allBelow, reason })
  if (n === 0) return none('no values')
  if (below === n) return none('no value lies above its limit', Math.max(...sample.below))
  if (sample.observed.length < FEWEST_OBSERVED) return none('fewer than three values lie above their limit: give the share above it')
  if (below / n > MOST_BELOW) return none('more than 80 % lie below their limit: give the share above it')
  const turn = (value: number): number => scale === 'logarithm' ? Math.log(value) : value
  const found = fit(sample.observed.map(turn), sample.below.map(turn))
  if (found === null) return none('the values above their limit have no spread')
  if (scale === 'linear') {
    return { n, below, mean: found.mean, standardDeviation: found.sd, logMean: null, logStandardDeviation: null, allBelow: null, reason: null }
  }
  const variance = found.sd * found.sd
  const mean = Math.exp(found.mean + variance / 2)
  return {
    n,
    below,
    mean,
    standardDeviation: mean * Math.sqrt(Math.expm1(variance)),
    logMean: found.mean,
    logStandardDeviation: found.sd,
    allBelow: null,
    reason: null,
  }
}

/** A quantile, or "< limit" when it falls where only limits are known. */
export type CensoredQuantile =
  | { value: number, lessThan: null, reason: null }
  | { value: null, lessThan: number, reason: null }
  | { value: null, lessThan: null, reason: string }

/**
 * Quantile with values below their limits: needs no model above the largest limit and is "< largest limit" below it.
 * @throws RangeError on NaN or infinity or a probability outside 0 to 1.
 */
export function censoredQuantile(sample: CensoredSample, p: number, type: QuantileType = 7): CensoredQuantile {
  requireSample(sample)
  requireUnit(p, 'p')
  if (sample.observed.length + sample.below.length === 0) return { value: null, lessThan: null, reason: 'no values' }
  const limit = sample.below.length === 0 ? -Infinity : Math.max(...sample.below)
  // Every value that is or may be under the largest limit is set at it: above it the order is then right.
  const held = [...sample.observed.map(value => Math.max(value, limit)), ...sample.below.map(() => limit)]
  const value = quantile(held, p, type)!
  return value > limit ? { value, lessThan: null, reason: null } : { value: null, lessThan: limit, reason: null }
}

/**
 * Mean with each "< limit" replaced by a share of its limit (one half by custom). A crude figure: the name of the
 * substitution must stand beside it. null when there are no values.
 * @throws RangeError on NaN or infinity or a share outside 0 to 1.
 */
export function substitutedMean(sample: CensoredSample, shareOfLimit: number): number | null {
  requireSample(sample)
  requireUnit(shareOfLimit, 'shareOfLimit')
  const values = [...sample.observed, ...sample.below.map(limit => limit * shareOfLimit)]
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length
}
