import { tCdf, tQuantile } from './distributions'
import { normalCdf, normalQuantile, normalUpper, normalDensity } from './normal'
import { integrate, panelRule } from './quadrature'

/** Which side of the limit is the good one: `lower`: at or above it; `upper`: at or below it. */
export type LimitKind = 'lower' | 'upper'

/** Coverage factor of every expanded uncertainty here (JCGM 100:2008 6.2: about 95 %). */
export const COVERAGE_FACTOR = 2

/**
 * Standard uncertainty of a shown value: the instrument's absolute and relative parts and the display
 * step as a rectangle of its full width (d²/12), added as squares (JCGM 100:2008 4.3.7, 5.1.2, F.2.2.1).
 * All in the unit of the value.
 */
export function combinedStandardUncertainty({ value, absolute, relative, resolution }: { value: number, absolute: number, relative: number, resolution: number }): number {
  return Math.sqrt(absolute * absolute + (relative * value) ** 2 + resolution * resolution / 12)
}

/** U = k u with k = 2. */
export const expandedUncertainty = (standardUncertainty: number): number => COVERAGE_FACTOR * standardUncertainty

/**
 * Probability that the true value keeps the limit, for a normal state of knowledge: Φ((T − y)/u) for an
 * upper limit, Φ((y − T)/u) for a lower one (JCGM 106:2012 clause 7).
 *
 * @throws RangeError where u is not above 0: without an uncertainty there is no probability.
 */
export function conformanceProbability({ value, u, limit, kind }: { value: number, u: number, limit: number, kind: LimitKind }): number {
  if (!(u > 0)) throw new RangeError(`The standard uncertainty must be above 0, not ${u}`)
  return kind === 'upper' ? normalCdf((limit - value) / u) : normalCdf((value - limit) / u)
}

/** The same between two limits: Φ((T_U − y)/u) − Φ((T_L − y)/u). */
export function conformanceProbabilityBetween({ value, u, lower, upper }: { value: number, u: number, lower: number, upper: number }): number {
  if (!(u > 0)) throw new RangeError(`The standard uncertainty must be above 0, not ${u}`)
  if (lower > upper) throw new RangeError('The lower limit lies above the upper one')
  const a = (lower - value) / u
  const b = (upper - value) / u
  // From the tail that is smaller, so that digits are kept.
  return a > 0 ? normalUpper(a) - normalUpper(b) : normalCdf(b) - normalCdf(a)
}

/**
 * Probability that a share which can't be negative lies at or below its upper limit: the normal
 * distribution cut at zero and renormalised (JCGM 106:2012 clauses 6 and 7: prior knowledge of the sign).
 */
export function conformanceProbabilityCutAtZero({ value, u, limit }: { value: number, u: number, limit: number }): number {
  if (!(u > 0)) throw new RangeError(`The standard uncertainty must be above 0, not ${u}`)
  if (limit <= 0) return 0
  return 1 - normalUpper((limit - value) / u) / normalCdf(value / u)
}

/** With few degrees of freedom: a scaled and shifted t distribution in place of the normal one (JCGM 101:2008 6.4.9). */
export function conformanceProbabilityT({ value, u, df, limit, kind }: { value: number, u: number, df: number, limit: number, kind: LimitKind }): number {
  if (!(u > 0)) throw new RangeError(`The standard uncertainty must be above 0, not ${u}`)
  return tCdf((kind === 'upper' ? limit - value : value - limit) / u, df)
}

export type SimpleDecision = 'accept' | 'reject'
/** `between`: inside the guard band on either side of the limit, too close to call. */
export type GuardedDecision = 'accept' | 'between' | 'reject'

/** Simple acceptance: the measured value is held against the limit as it is; on the limit is kept (ILAC-G8:09/2019 4.2.1). */
export function decideSimple({ value, limit, kind }: { value: number, limit: number, kind: LimitKind }): SimpleDecision {
  return (kind === 'upper' ? value <= limit : value >= limit) ? 'accept' : 'reject'
}

/**
 * Guarded acceptance and guarded rejection with one guard band of width w on each side of the limit: a
 * decision only where the value lies at least w inside or more than w beyond (JCGM 106:2012 8.3, ILAC-G8:09/2019 clause 4).
 */
export function decideGuarded({ value, limit, kind, guardBand }: { value: number, limit: number, kind: LimitKind, guardBand: number }): GuardedDecision {
  if (!(guardBand >= 0)) throw new RangeError(`The guard band must be at least 0, not ${guardBand}`)
  const inside = kind === 'upper' ? limit - value : value - limit
  if (inside >= guardBand) return 'accept'
  return inside < -guardBand ? 'reject' : 'between'
}

/** Largest probability of a false acceptance of one item whose value lies just at the acceptance limit: 1 − Φ(2 w/U) for a guard band of w times U (ILAC-G8:09/2019 table 1). */
export function largestSpecificFalseAccept({ guardBandOverU }: { guardBandOverU: number }): number {
  return normalUpper(COVERAGE_FACTOR * guardBandOverU)
}

/** Guard band, in the unit of u, that keeps the specific probability of a false acceptance at or below alpha: w = z(1 − α) u (JCGM 106:2012 8.3.2). */
export function guardBandFor({ alpha, u }: { alpha: number, u: number }): number {
  return -normalQuantile(alpha) * u
}

/** Guarded rejection where u is a share of the reading: the smallest reading that lies above the limit with the wanted confidence, y = T/(1 − z r) (JCGM 106:2012 8.3.3). @throws RangeError where no reading does. */
export function smallestReadingAbove({ limit, relativeU, confidence }: { limit: number, relativeU: number, confidence: number }): number {
  const room = 1 - normalQuantile(confidence) * relativeU
  if (!(room > 0)) throw new RangeError('With this relative uncertainty no reading is surely above the limit')
  return limit / room
}

export interface GlobalRisk { processConforming: number, falseAccept: number, falseReject: number }
type Bounds = readonly [number | null, number | null]

/**
 * Global risks of a decision rule for a normal process (prior) and a normal measurement: the share that
 * conforms, and the probabilities that an item drawn from the process is accepted though it does not
 * conform, or rejected though it does (JCGM 106:2012 clause 9.5). Null stands for no limit on that side.
 */
export function globalRisk({ priorMean, priorSd, u, tolerance, acceptance }: { priorMean: number, priorSd: number, u: number, tolerance: Bounds, acceptance: Bounds }): GlobalRisk {
  if (!(priorSd > 0 && u > 0)) throw new RangeError('Both standard deviations must be above 0')
  const [lower, upper] = [tolerance[0] ?? -Infinity, tolerance[1] ?? Infinity]
  const accepted = (value: number): number => {
    const below = acceptance[0] === null ? 0 : normalCdf((acceptance[0] - value) / u)
    const above = acceptance[1] === null ? 0 : normalUpper((acceptance[1] - value) / u)
    return 1 - below - above
  }
  const density = (value: number): number => normalDensity((value - priorMean) / priorSd) / priorSd
  const overRange = (from: number, to: number, f: (value: number) => number): number => {
    const [a, b] = [Math.max(from, priorMean - 12 * priorSd), Math.min(to, priorMean + 12 * priorSd)]
    return b > a ? integrate(f, panelRule([a, b], 400)) : 0
  }
  const falseAcceptAt = (value: number) => density(value) * accepted(value)
  const falseRejectAt = (value: number) => density(value) * (1 - accepted(value))
  return {
    processConforming: normalCdf((upper - priorMean) / priorSd) - normalCdf((lower - priorMean) / priorSd),
    falseAccept: overRange(-Infinity, lower, falseAcceptAt) + overRange(upper, Infinity, falseAcceptAt),
    falseReject: overRange(lower, upper, falseRejectAt),
  }
}

/**
 * Several independent contributions: u² = Σ u_i², and the effective degrees of freedom of Welch and
 * Satterthwaite, u⁴/Σ(u_i⁴/ν_i); the coverage factor is that of Student's t with the degrees rounded down (JCGM 100:2008 G.4).
 */
export function combineContributions({ u, df, coverage }: { u: readonly number[], df: readonly number[], coverage: number }): { u: number, dfEffective: number, k: number } {
  if (u.length === 0 || u.length !== df.length) throw new RangeError('Each contribution needs its degrees of freedom')
  const square = u.reduce((sum, value) => sum + value * value, 0)
  const dfEffective = square * square / u.reduce((sum, value, i) => sum + value ** 4 / df[i]!, 0)
  return { u: Math.sqrt(square), dfEffective, k: tQuantile((1 + coverage) / 2, Math.max(1, Math.floor(dfEffective))) }
}
