import type { JudgedSample } from '../sample'
import type { DecisionRule, RefrigerantLimits, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/** The declared refrigerant's share of the air-free sample; exactly on the limit is kept. */
export function judgePurity(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult {
  return againstLimit('purity', sample.purity, limits.purityMinimum, 'minimum', decision)
}
