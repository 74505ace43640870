import type { AirCounting, SumCheck } from '../composition/types'
import { refuse, type Refusal } from './refusal'

/**
 * Refuses percentages that can't be a composition, with the difference told; undefined where they may be
 * one, also where the sum is only flagged.
 */
export function refuseSum(sum: SumCheck, air: AirCounting): Refusal | undefined {
  if (sum.outcome !== 'refused') return undefined
  const counted = air === 'within' ? 'The parts and air' : 'The parts'
  const difference = `${inDigits(Math.abs(sum.differencePercent))} ${sum.differencePercent < 0 ? 'below' : 'above'} 100`
  const reason = `${counted} add up to ${inDigits(sum.percent)} percent, ${difference}; rounding explains ${inDigits(sum.tolerancePercent)}.`
  // Shares of 1 instead of shares of 100.
  if (Math.abs(sum.percent - 1) <= 0.1) return refuse('sum', { pointer: '/composition', reason: `${reason} Fractions?`, mend: 'These look like fractions: send percentages, 0 to 100.' })
  return refuse('sum', { pointer: '/composition', reason })
}

/** Without the dust of binary fractions. */
function inDigits(value: number): string {
  return String(Number(value.toPrecision(6)))
}
