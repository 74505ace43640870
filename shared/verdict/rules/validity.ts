import type { SumCheck } from '../../composition/types'
import type { RuleName, RuleOutcome, RuleResult, SampleValidity } from '../types'
import { toMillionth } from './against-limit'

function noted(rule: RuleName, outcome: RuleOutcome, measured: number | null = null, limit: number | null = null): RuleResult {
  return { rule, outcome, measured, uncertainty: null, limit, probabilityBeyond: null }
}

/**
 * Was the reading itself fit to be judged? An overdue calibration is carried for ever but does not stop
 * the work; a spent filter, a temperature outside the instrument's range (SAE J2912: 10 to 49 °C), an
 * instrument out of control, and parts that don't add up make a good result doubtful.
 */
export function judgeValidity(validity: SampleValidity, sum: SumCheck): RuleResult[] {
  const { ambientCelsius, ambientMinimumCelsius, ambientMaximumCelsius } = validity
  const ambient = ambientCelsius === null
    ? noted('ambient', 'absent')
    : ambientCelsius < ambientMinimumCelsius
      ? noted('ambient', 'unclear', ambientCelsius, ambientMinimumCelsius)
      : noted('ambient', ambientCelsius > ambientMaximumCelsius ? 'unclear' : 'pass', ambientCelsius, ambientMaximumCelsius)
  return [
    noted('sum', sum.outcome === 'agrees' ? 'pass' : 'unclear', toMillionth(sum.percent), 100),
    noted('calibration', validity.calibrationOverdue ? 'warn' : 'pass'),
    noted('filter', validity.filterSpent ? 'unclear' : 'pass'),
    ambient,
    noted('control', validity.instrumentOutOfControl ? 'unclear' : 'pass'),
  ]
}
