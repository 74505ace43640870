import { logGamma } from './gamma'
import { requireWhole } from './guards'
import { normalCdf, normalDensity } from './normal'
import { panelRule } from './quadrature'

/** Constants of control charts for subgroups of n normal values; computed, not typed. */
export interface ControlConstants {
  n: number
  /** Mean and standard deviation of the range in units of σ. */
  d2: number
  d3: number
  /** Mean of the standard deviation in units of σ. */
  c4: number
  A2: number
  A3: number
  B3: number
  B4: number
  D3: number
  D4: number
}

/** Mean of a standard deviation of n values in units of σ, √(2/(n - 1)) Γ(n/2)/Γ((n - 1)/2). @throws RangeError unless n >= 2 is whole. */
export function c4(n: number): number {
  requireWhole(n, 'n', 2)
  return Math.sqrt(2 / (n - 1)) * Math.exp(logGamma(n / 2) - logGamma((n - 1) / 2))
}

/** Mean and standard deviation of the range of n standard normal values. */
function rangeMoments(n: number): { d2: number, d3: number } {
  const reach = 10
  const line = panelRule([-reach, 0, reach], 6)
  const d2 = line.points.reduce((sum, x, i) => sum + line.weights[i]! * (1 - normalCdf(x) ** n - normalCdf(-x) ** n), 0)
  const density = line.points.map((x, i) => line.weights[i]! * normalDensity(x))
  const ranges = panelRule([0, 4, 16], 4)
  const square = ranges.points.reduce((sum, w, i) => {
    // P(range > w): 1 - n ∫ φ(x) (Φ(x + w) - Φ(x))^(n-1) dx.
    const within = line.points.reduce((inner, x, j) => inner + density[j]! * (normalCdf(x + w) - normalCdf(x)) ** (n - 1), 0)
    return sum + ranges.weights[i]! * 2 * w * (1 - n * within)
  }, 0)
  return { d2, d3: Math.sqrt(square - d2 * d2) }
}

const computed = new Map<number, ControlConstants>()

/**
 * Control chart constants of subgroups of n values.
 * d2 = ∫ (1 - Φⁿ - (1 - Φ)ⁿ); d3² = 2 ∫ w P(range > w) dw - d2²; A2 = 3/(d2 √n); A3 = 3/(c4 √n);
 * B3, B4 = 1 ∓ 3 √(1 - c4²)/c4; D3, D4 = 1 ∓ 3 d3/d2; negative ones are 0.
 * Source: NIST/SEMATECH e-Handbook 6.3.2.1; ISO 7870-2 and ASTM E2587 (from memory).
 * @throws RangeError unless n is whole, from 2 to 100.
 */
export function controlConstants(n: number): ControlConstants {
  requireWhole(n, 'n', 2, 100)
  const known = computed.get(n)
  if (known) return known
  const { d2, d3 } = rangeMoments(n)
  const c = c4(n)
  const root = Math.sqrt(n)
  const spread = 3 * Math.sqrt(1 - c * c) / c
  const constants = {
    n,
    d2,
    d3,
    c4: c,
    A2: 3 / (d2 * root),
    A3: 3 / (c * root),
    B3: Math.max(0, 1 - spread),
    B4: 1 + spread,
    D3: Math.max(0, 1 - 3 * d3 / d2),
    D4: 1 + 3 * d3 / d2,
  }
  computed.set(n, constants)
  return constants
}
