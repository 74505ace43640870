import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compareEachWithRest, compareManyShares } from '#shared/statistics/share-comparison'

describe('many shares', () => {
  it('find the one shop that stands out, and say so in words', () => {
    const answers = compareEachWithRest([
      { name: 'North', x: 30, n: 100 },
      { name: 'South', x: 8, n: 100 },
      { name: 'East', x: 13, n: 100 },
      { name: 'New', x: 1, n: 4 },
    ], 0.95)
    expect(answers.map(answer => answer.found)).toEqual(['higher', 'lower', 'no difference shown', 'not enough data to tell'])
    expect(answers[0]!.words).toBe('North: higher, also after allowing for the number of comparisons.')
    expect(answers[3]!.words).toContain('an expected count is below 5')
    expect(answers[3]!.adjustedP).toBeNull()
  })

  it('are stricter the more is asked', () => {
    const one = { name: 'one', a: { x: 20, n: 100 }, b: { x: 10, n: 100 } }
    const dull = Array.from({ length: 9 }, (_, i) => ({ name: `${i}`, a: { x: 50, n: 100 }, b: { x: 50, n: 100 } }))
    expect(compareManyShares([one], 0.95)[0]!.found).toBe('higher')
    expect(compareManyShares([one, ...dull], 0.95)[0]!.found).toBe('no difference shown')
  })

  it('never adjust a p downwards', () => {
    const share = fc.integer({ min: 1, max: 200 }).chain(n => fc.record({ x: fc.integer({ min: 0, max: n }), n: fc.constant(n) }))
    fc.assert(fc.property(fc.array(fc.record({ name: fc.string(), a: share, b: share }), { maxLength: 6 }), (questions) => {
      for (const { test, adjustedP } of compareManyShares(questions, 0.95)) {
        if (adjustedP !== null) expect(adjustedP).toBeGreaterThanOrEqual(test.p! - 1e-15)
      }
    }))
  })

  it('have nothing to say of nothing', () => {
    expect(compareManyShares([], 0.95)).toEqual([])
    expect(compareEachWithRest([{ name: 'alone', x: 1, n: 5 }], 0.95)[0]).toMatchObject({ found: 'not enough data to tell', test: { reason: 'a group is empty' } })
    expect(() => compareManyShares([], 1)).toThrow('confidence')
  })
})
