import type { JudgedSample } from '../sample'
import type { Limit, RefrigerantLimits, RuleName, RuleResult } from '../types'
import { againstLimit } from './against-limit'

/** Air is purged by the machine and mixes with nothing, so its limits are held as they are: no guard band sends anyone to sample again. */
function judgeLevel(rule: RuleName, sample: JudgedSample, limit: Limit, reached: 'warn' | 'fail'): RuleResult {
  if (!sample.air) return { rule, outcome: 'absent', measured: null, uncertainty: null, limit: limit.value, probabilityBeyond: null }
  const result = againstLimit(rule, sample.air, limit, 'action-level', { kind: 'simple', guardFactor: 0 })
  return { ...result, outcome: result.outcome === 'fail' ? reached : 'pass' }
}

/** Caution level: noted. Action level: purge. */
export function judgeAir(sample: JudgedSample, limits: RefrigerantLimits): RuleResult[] {
  return [judgeLevel('air-caution', sample, limits.airCaution, 'warn'), judgeLevel('air-action', sample, limits.airAction, 'fail')]
}
