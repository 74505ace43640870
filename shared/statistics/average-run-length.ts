import { requireFinite, requireNotNegative, requirePositive } from './guards'
import { solveLinear } from './linear-system'
import { normalCdf, normalDensity } from './normal'
import { gaussLegendre } from './quadrature'

const ORDER = 100

/**
 * Average number of values until an individuals chart with limits at ±width σ signals; without a shift 370 at width 3.
 * @param width of the limits in standard deviations
 * @param shift of the mean in standard deviations
 * @throws RangeError on a wrong argument.
 */
export function individualsRunLength(width: number, shift: number): number {
  requirePositive(width, 'width')
  requireFinite(shift, 'shift')
  return 1 / (normalCdf(-width - shift) + normalCdf(shift - width))
}

export interface EwmaDesign {
  /** Weight of the newest value, above 0 and up to 1. */
  lambda: number
  /** Half width of the settled limits in standard deviations of the average. */
  width: number
}

/**
 * Average run length of an EWMA chart with its settled limits, started at the target.
 * ARL(u) = 1 + ∫ ARL(x) φ((x - (1 - λ)u)/λ - shift)/λ dx over the limits, solved at Gauss-Legendre points.
 * Source: Crowder 1987, Technometrics 29, 401; Lucas and Saccucci 1990, Technometrics 32, 1 (both from memory).
 * @param shift of the mean in standard deviations of a single value
 * @throws RangeError on a wrong argument; λ below 0.01 is refused, its kernel is too narrow for the points.
 */
export function ewmaRunLength(design: EwmaDesign, shift: number): number {
  const { lambda, width } = design
  if (!(lambda >= 0.01 && lambda <= 1)) throw new RangeError(`lambda must lie between 0.01 and 1, not ${lambda}`)
  requirePositive(width, 'width')
  requireFinite(shift, 'shift')
  const limit = width * Math.sqrt(lambda / (2 - lambda))
  const rule = gaussLegendre(ORDER)
  const points = rule.points.map(point => point * limit)
  const row = (from: number): number[] =>
    points.map((x, j) => rule.weights[j]! * limit * normalDensity((x - (1 - lambda) * from) / lambda - shift) / lambda)
  const matrix = points.map((from, i) => row(from).map((value, j) => (i === j ? 1 : 0) - value))
  const lengths = solveLinear(matrix, points.map(() => 1))
  return 1 + row(0).reduce((sum, value, j) => sum + value * lengths[j]!, 0)
}

export interface CusumDesign {
  /** Allowance and decision limit in standard deviations. */
  k: number
  h: number
}

/** Average run lengths of the upper sum from each of `starts`: ARL(s) = 1 + ARL(0) Φ(k - s - shift) + ∫₀ʰ ARL(x) φ(x + k - s - shift) dx. */
function upperRunLengths(design: CusumDesign, shift: number, starts: readonly number[]): number[] {
  const { k, h } = design
  const rule = gaussLegendre(ORDER)
  const points = rule.points.map(point => (point + 1) * h / 2)
  // The first unknown is the run length from 0, where the sum rests with a probability of its own.
  const row = (from: number): number[] => [
    normalCdf(k - from - shift),
    ...points.map((x, j) => rule.weights[j]! * h / 2 * normalDensity(x + k - from - shift)),
  ]
  const froms = [0, ...points]
  const matrix = froms.map((from, i) => row(from).map((value, j) => (i === j ? 1 : 0) - value))
  const lengths = solveLinear(matrix, froms.map(() => 1))
  return starts.map(start => 1 + row(start).reduce((sum, value, j) => sum + value * lengths[j]!, 0))
}

function requireCusum(design: CusumDesign, shift: number): void {
  requireNotNegative(design.k, 'k')
  requirePositive(design.h, 'h')
  requireFinite(shift, 'shift')
}

/**
 * Average run length of a one-sided tabular cumulative sum (the upper one).
 * Source: Page 1954; Lucas and Crosier 1982, Technometrics 24, 199 (both from memory).
 * @param start of the sum in standard deviations, 0 or a head start
 * @throws RangeError on a wrong argument.
 */
export function oneSidedCusumRunLength(design: CusumDesign, shift: number, start = 0): number {
  requireCusum(design, shift)
  requireNotNegative(start, 'start')
  if (start > design.h) throw new RangeError(`start must not be above h, not ${start}`)
  return upperRunLengths(design, shift, [start])[0]!
}

/**
 * Average run length of the two-sided tabular cumulative sum, both sums from `start`:
 * from 0, 1/ARL = 1/ARL⁺ + 1/ARL⁻; with a head start
 * (ARL⁺(s) ARL⁻(0) + ARL⁺(0) ARL⁻(s) - ARL⁺(0) ARL⁻(0)) / (ARL⁺(0) + ARL⁻(0)).
 * Source: Lucas and Crosier 1982 (from memory).
 * @throws RangeError on a wrong argument.
 */
export function cusumRunLength(design: CusumDesign, shift: number, start = 0): number {
  requireCusum(design, shift)
  requireNotNegative(start, 'start')
  if (start > design.h) throw new RangeError(`start must not be above h, not ${start}`)
  const [up, upStarted] = upperRunLengths(design, shift, [0, start]) as [number, number]
  const [down, downStarted] = upperRunLengths(design, -shift, [0, start]) as [number, number]
  return (upStarted / up + downStarted / down - 1) / (1 / up + 1 / down)
}
