import { describe, expect, it } from 'vitest'
import { checkStandardSignals, type CheckStandardRule } from '#shared/statistics/check-standard-rules'

function at(z: (number | null)[], rule: CheckStandardRule): number[] {
  return checkStandardSignals(z).filter(signal => signal.rule === rule).map(signal => signal.at)
}

describe('check standard rules', () => {
  it('warn at two and reject at three', () => {
    const signals = checkStandardSignals([0, 2.1, -3.1, 2])
    expect(signals).toContainEqual({ rule: '1_2s', kind: 'warning', at: 1 })
    expect(signals).toContainEqual({ rule: '1_3s', kind: 'rejection', at: 2 })
    expect(signals.some(signal => signal.at === 3)).toBe(false)
  })

  it('take two beyond two on one side, and four beyond one', () => {
    expect(at([2.1, 2.2], '2_2s')).toEqual([1])
    expect(at([2.1, -2.2], '2_2s')).toEqual([])
    expect(at([1.1, 1.2, 1.3, 1.4], '4_1s')).toEqual([3])
    expect(at([1.1, 1.2, -1.3, 1.4], '4_1s')).toEqual([])
  })

  it('take R_4s only between neighbours in time', () => {
    expect(at([2.1, -2.1], 'R_4s')).toEqual([1])
    expect(at([2.1, 0, -2.1], 'R_4s')).toEqual([])
    expect(at([2.1, null, -2.1], 'R_4s')).toEqual([])
    expect(at([3.5, -1], 'R_4s')).toEqual([])
  })

  it('take ten on one side of the assigned value', () => {
    const ten = Array.from({ length: 10 }, () => -0.1)
    expect(at(ten, '10_x')).toEqual([9])
    expect(at([...ten.slice(0, 9), 0], '10_x')).toEqual([])
  })

  it('refuse what is not a number', () => {
    expect(() => checkStandardSignals([Infinity])).toThrow('z[0]')
  })
})
