import type { JudgedSample } from '../sample'
import type { RuleResult } from '../types'
import { toMillionth } from './against-limit'

/** From this share on, another substance is what the system holds. */
const DOMINANT_PERCENT = 50

/** Is it the declared refrigerant at all? Fails where another one makes up half or more. */
export function judgeDeclared(sample: JudgedSample): RuleResult {
  let dominant: RuleResult['substance']
  let most = 0
  for (const { substance, quantity } of sample.foreign) {
    if (quantity.percent > most) {
      most = quantity.percent
      dominant = substance
    }
  }
  const wrong = most >= DOMINANT_PERCENT && sample.purity.percent < DOMINANT_PERCENT
  return {
    rule: 'declared', ...(wrong && dominant ? { substance: dominant } : {}), outcome: wrong ? 'fail' : 'pass',
    measured: toMillionth(sample.purity.percent), uncertainty: null, limit: null, probabilityBeyond: null,
  }
}
