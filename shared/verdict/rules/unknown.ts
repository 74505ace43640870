import type { JudgedSample } from '../sample'
import type { DecisionRule, RefrigerantLimits, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/** What the instrument could not identify: treated as foreign, and as possibly flammable. */
export function judgeUnknown(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult {
  return againstLimit('unknown', sample.unknown, limits.unknownMaximum, 'action-level', decision)
}
