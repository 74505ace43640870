import { describe, expect, it } from 'vitest'
import { refuseSum } from '#shared/intake/sum-refusal'

describe('a sum that can\'t be a composition', () => {
  it('is refused with the difference', () => {
    const refusal = refuseSum({ percent: 97.00000000000001, differencePercent: -2.9999999999999858, tolerancePercent: 0.1, outcome: 'refused' }, 'apart')
    expect(refusal).toMatchObject({ code: 'sum', pointer: '/composition', reason: 'The parts add up to 97 percent, 3 below 100; rounding explains 0.1.' })
  })

  it('names air where it counts', () => {
    expect(refuseSum({ percent: 104, differencePercent: 4, tolerancePercent: 0.15, outcome: 'refused' }, 'within')!.reason).toBe('The parts and air add up to 104 percent, 4 above 100; rounding explains 0.15.')
  })

  it('asks about fractions where it comes to 1', () => {
    expect(refuseSum({ percent: 0.994, differencePercent: -99.006, tolerancePercent: 0.1, outcome: 'refused' }, 'apart')).toMatchObject({ code: 'sum', mend: expect.stringContaining('fractions') })
  })

  it.each(['agrees', 'flagged'] as const)('is not one that %s', (outcome) => {
    expect(refuseSum({ percent: 99.7, differencePercent: -0.3, tolerancePercent: 0.1, outcome }, 'apart')).toBeUndefined()
  })
})
