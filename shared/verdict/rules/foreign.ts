import type { JudgedSample } from '../sample'
import type { DecisionRule, RefrigerantLimits, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/** Each refrigerant other than the declared one, for itself. A recycling machine never separates one from another. */
export function judgeForeign(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  return sample.foreign.map(({ substance, quantity }) => againstLimit('foreign', quantity, limits.foreignMaximum, 'maximum', decision, substance))
}
