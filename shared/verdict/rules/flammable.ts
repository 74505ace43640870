import type { JudgedSample } from '../sample'
import type { DecisionRule, RefrigerantLimits, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/**
 * Flammable content that was not declared, apart from purity: 98 % pure with 2 % hydrocarbon is still
 * flammable. First hydrocarbons and classes 2 and 3 of ASHRAE 34; where a class 2L refrigerant was seen
 * too, a second result names it and counts all of it. That a mixture with little of it may be classed as
 * not flammable (R-513A is) is nothing a shop can measure, so none is reckoned to be.
 */
export function judgeFlammable({ flammable, flammableWithMild }: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  const first = againstLimit('flammable', flammable, limits.flammableMaximum, 'action-level', decision)
  if (flammableWithMild === null) return [first]
  return [first, againstLimit('flammable', flammableWithMild.quantity, limits.flammableMaximum, 'action-level', decision, flammableWithMild.substance)]
}
