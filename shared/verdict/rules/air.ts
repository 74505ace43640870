import { NOT_REPORTED, type JudgedSample, type Quantity } from '../sample'
import type { Limit, RefrigerantLimits, RuleName, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/**
 * Air by mass to air by mole: x = k w / (k w + 1 − w) with k = M̄ / M_air; the uncertainty by its slope,
 * x (1 − x) / (w (1 − w)) = k / (k w + 1 − w)².
 */
function byMole({ percent, u, roundingVariance, detectionLimit }: Quantity, k: number): Quantity {
  const whole = (share: number) => k * share + 1 - share
  const mole = (share: number) => k * share / whole(share) * 100
  const slope = k / whole(percent / 100) ** 2
  return { percent: mole(percent / 100), u: u * slope, roundingVariance: roundingVariance * slope * slope, detectionLimit: detectionLimit === null ? null : mole(detectionLimit / 100) }
}

/**
 * Air is purged by the machine and spoils no other charge, so its limits are held as they are: no guard
 * band sends anyone to sample again. A detection limit above the level is noted, and decides nothing.
 */
function judgeLevel(rule: RuleName, { air, molarMassOverAir }: JudgedSample, limit: Limit, reached: 'warn' | 'fail'): RuleResult {
  const quantity = air === null ? NOT_REPORTED : limit.unit === 'percent by mole of the sample' ? byMole(air, molarMassOverAir) : air
  const result = againstLimit(rule, quantity, limit, 'action-level', { kind: 'simple', guardFactor: 0 })
  if (result.outcome === 'fail') result.outcome = reached
  else if (result.outcome === 'unclear') result.outcome = 'warn'
  return result
}

/** Caution level: noted. Action level: purge. */
export function judgeAir(sample: JudgedSample, limits: RefrigerantLimits): RuleResult[] {
  return [judgeLevel('air-caution', sample, limits.airCaution, 'warn'), judgeLevel('air-action', sample, limits.airAction, 'fail')]
}
