import { COVERAGE_FACTOR } from '../../statistics/decision'
import { normalCdf, normalUpper } from '../../statistics/normal'
import { NOT_REPORTED, type Quantity } from '../sample'
import type { DecisionRule, Limit, RuleName, RuleOutcome, RuleResult } from '../types'
import type { Substance } from '../../refrigerants/designations'

/** A value that differs from the limit by less than this lies on it: the arithmetic's own noise. */
const ON_THE_LIMIT = 1e-9

/**
 * `minimum`: at or above is kept. `maximum`: at or below is kept. `action-level`: at or above calls for
 * action, and doubt counts against (flammable, unknown, air).
 */
export type LimitSense = 'minimum' | 'maximum' | 'action-level'

/** How far the value lies on the good side of the limit; negative beyond it. */
function inside(value: number, limit: number, sense: LimitSense): number {
  const difference = sense === 'minimum' ? value - limit : limit - value
  return Math.abs(difference) < ON_THE_LIMIT ? 0 : difference
}

/**
 * Simple or guarded decision with a guard band of guardFactor · U (JCGM 106:2012 8.3, ILAC-G8:09/2019
 * clause 4). On an action level, reaching it is enough; a doubt remains only below it.
 */
function outcomeOf(value: number, u: number, limit: number, sense: LimitSense, decision: DecisionRule): RuleOutcome {
  const room = inside(value, limit, sense)
  const beyond = sense === 'action-level' ? room <= 0 : room < 0
  if (decision.kind === 'simple') return beyond ? 'fail' : 'pass'
  const guardBand = decision.guardFactor * COVERAGE_FACTOR * u
  if (sense === 'action-level') return beyond ? 'fail' : room < guardBand - ON_THE_LIMIT ? 'unclear' : 'pass'
  if (room >= guardBand - ON_THE_LIMIT) return 'pass'
  return room < -guardBand ? 'fail' : 'unclear'
}

/** So many standard uncertainties from the limit the probability is 0 or 1 to the ninth decimal. */
const BEYOND_DOUBT = 6

/**
 * Probability of lying beyond the limit. A share can't be negative nor above 100, so the normal
 * distribution is cut there (JCGM 106:2012 clauses 6 and 7); for a minimum the rest to 100 is looked at.
 */
function probabilityBeyond(value: number, u: number, limit: number, sense: LimitSense): number | null {
  if (u <= 0) return null
  const z = (sense === 'minimum' ? value - limit : limit - value) / u
  if (z > BEYOND_DOUBT) return 0
  if (z < -BEYOND_DOUBT) return 1
  return Math.min(1, normalUpper(z) / normalCdf((sense === 'minimum' ? 100 - value : value) / u))
}

/** A millionth of a percent: finer than any instrument, and the same number in every place that it is kept. */
export const toMillionth = (value: number): number => Math.round(value * 1e6) / 1e6

/**
 * One quantity against one limit. What lies below a detection limit that itself keeps the limit passes;
 * where the detection limit is too coarse for that, it is unclear. What was not reported is absent.
 */
export function againstLimit(rule: RuleName, quantity: Quantity, { value: limit }: Limit, sense: LimitSense, decision: DecisionRule, substance?: Substance): RuleResult {
  const result: RuleResult = { rule, outcome: 'absent', measured: null, uncertainty: null, limit, probabilityBeyond: null }
  if (substance) result.substance = substance
  if (quantity === NOT_REPORTED) return result
  const { percent, u, detectionLimit } = quantity
  if (detectionLimit !== null) {
    const room = inside(detectionLimit, limit, sense)
    result.outcome = room > 0 || (sense === 'maximum' && room === 0) ? 'pass' : 'unclear'
    result.measured = toMillionth(detectionLimit)
    result.belowDetection = true
    return result
  }
  const chance = probabilityBeyond(percent, u, limit, sense)
  result.outcome = outcomeOf(percent, u, limit, sense, decision)
  result.measured = toMillionth(percent)
  result.uncertainty = toMillionth(COVERAGE_FACTOR * u)
  result.probabilityBeyond = chance === null ? null : toMillionth(chance)
  return result
}
