import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { NELSON_RULES, runRuleSignals, runRuleWords, WESTERN_ELECTRIC_RULES, type RunRule } from '#shared/statistics/run-rules'

/** Positions at which a rule completes. */
function at(z: (number | null)[], rule: RunRule, sameSideLength = 9): number[] {
  return runRuleSignals(z, { rules: [rule], sameSideLength }).map(signal => signal.at)
}

const times = (n: number, value: number): number[] => Array.from({ length: n }, () => value)

describe('run rules', () => {
  it('1: a point on three sigma is not beyond', () => {
    expect(at([3, -3, 3.01, -3.01], 1)).toEqual([2, 3])
  })

  it('2: the length is a setting; a value on the centre line is on neither side', () => {
    expect(at(times(9, 0.1), 2)).toEqual([8])
    expect(at(times(9, 0.1), 2, 8)).toEqual([7, 8])
    expect(at(times(9, 0.1), 2, 7)).toEqual([6, 7, 8])
    expect(at([...times(5, 0.1), 0, ...times(8, 0.1)], 2)).toEqual([])
    expect(at([...times(5, 0.1), ...times(8, -0.1)], 2)).toEqual([])
  })

  it('3: a tie ends a trend', () => {
    expect(at([1, 2, 3, 4, 5, 6].map(x => x / 10), 3)).toEqual([5])
    expect(at([6, 5, 4, 3, 2, 1].map(x => x / 10), 3)).toEqual([5])
    expect(at([1, 2, 3, 3, 4, 5, 6].map(x => x / 10), 3)).toEqual([])
  })

  it('4: fourteen in turn', () => {
    const zigzag = Array.from({ length: 14 }, (_, i) => (i % 2 ? 0.5 : -0.5))
    expect(at(zigzag, 4)).toEqual([13])
    expect(at(zigzag.map(x => -x), 4)).toEqual([13])
    expect(at(zigzag.slice(1), 4)).toEqual([])
    expect(at([...zigzag.slice(0, 7), zigzag[6]!, ...zigzag.slice(7)], 4)).toEqual([])
  })

  it('5 and 6: on one side, and the point itself among them', () => {
    expect(at([2.1, 0, 2.1, 0], 5)).toEqual([2])
    expect(at([2.1, 0, -2.1], 5)).toEqual([])
    expect(at([2, 0, 2.1], 5)).toEqual([])
    expect(at([2.1, 0, 0, 2.1], 5)).toEqual([])
    expect(at([1.1, 1.1, 0, 1.1, 1.1], 6)).toEqual([4])
    expect(at([-1.1, -1.1, -1.1, -1.1], 6)).toEqual([3])
    expect(at([1.1, 1.1, -1.1, -1.1, 1.1], 6)).toEqual([])
  })

  it('7 and 8: the line of one sigma belongs to the inside', () => {
    expect(at(times(15, 1), 7)).toEqual([14])
    expect(at([...times(14, 0.2), 1.01], 7)).toEqual([])
    expect(at([1.1, -1.1, 1.1, -1.1, 1.1, -1.1, 1.1, -1.1], 8)).toEqual([7])
    expect(at([1.1, -1.1, 1.1, 1, 1.1, -1.1, 1.1, -1.1], 8)).toEqual([])
  })

  it('end at a missing value and count positions over it', () => {
    expect(at([...times(5, 0.1), null, ...times(5, 0.1)], 2)).toEqual([])
    expect(runRuleSignals([0, null, ...times(9, 0.1)], { rules: [2], sameSideLength: 9 })).toEqual([{ rule: 2, at: 10, from: 2 }])
  })

  it('mirror: turning all signs changes nothing', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: -4, max: 4, noNaN: true }), { maxLength: 60 }), (z) => {
      expect(runRuleSignals(z.map(x => -x), NELSON_RULES)).toEqual(runRuleSignals(z, NELSON_RULES))
    }))
  })

  it('only look back: later values change no earlier signal', () => {
    const z = fc.array(fc.double({ min: -4, max: 4, noNaN: true }), { minLength: 1, maxLength: 40 })
    fc.assert(fc.property(z, z, (first, later) => {
      const before = runRuleSignals(first, WESTERN_ELECTRIC_RULES)
      const all = runRuleSignals([...first, ...later], WESTERN_ELECTRIC_RULES)
      expect(all.filter(signal => signal.at < first.length)).toEqual(before)
    }))
  })

  it('say what they ask for', () => {
    expect(runRuleWords(2, 7)).toContain('7 points')
    expect(new Set(NELSON_RULES.rules.map(rule => runRuleWords(rule, 9))).size).toBe(8)
  })

  it('refuse what is not a number', () => {
    expect(() => runRuleSignals([NaN], NELSON_RULES)).toThrow('z[0]')
    expect(() => runRuleSignals([1], { rules: [2], sameSideLength: 1 })).toThrow('sameSideLength')
  })
})
