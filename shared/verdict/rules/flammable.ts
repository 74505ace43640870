import type { JudgedSample } from '../sample'
import type { DecisionRule, RefrigerantLimits, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/** Hydrocarbons and other flammable content that was not declared, apart from purity: 98 % pure with 2 % hydrocarbon is still flammable. */
export function judgeFlammable(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult {
  return againstLimit('flammable', sample.flammable, limits.flammableMaximum, 'action-level', decision)
}
