import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { oneWayAnova } from '#shared/statistics/anova'
import { welch } from '#shared/statistics/compare'

const group = fc.array(fc.integer({ min: -100, max: 100 }), { minLength: 2, maxLength: 8 })

describe('one-way analysis of variance', () => {
  it('keeps its digits under thirteen leading digits in common (the pattern of NIST StRD SmLs07)', () => {
    const low = [[1.25, 1.5, 1.75], [1.5, 2, 2.5], [1, 1.25, 1.5]]
    const plain = oneWayAnova(low)
    const high = oneWayAnova(low.map(values => values.map(x => x + 1e12)))
    expect(high.f).toBe(plain.f)
    expect(high.sumOfSquaresWithin).toBe(plain.sumOfSquaresWithin)
  })

  it('does not change with shift and scale', () => {
    fc.assert(fc.property(group, group, group, fc.integer({ min: 1, max: 20 }), (a, b, c, scale) => {
      const plain = oneWayAnova([a, b, c])
      fc.pre(plain.f !== null)
      expect(oneWayAnova([c, a, b].map(values => values.map(x => scale * x + 7))).f! / (plain.f! || 1)).toBeCloseTo(plain.f! === 0 ? 0 : 1, 9)
      expect(plain.rSquared!).toBeGreaterThanOrEqual(0)
      expect(plain.rSquared!).toBeLessThanOrEqual(1)
    }))
  })

  it('is the pooled t test squared for two groups of one size and spread', () => {
    const a = [1, 2, 3]
    const b = [4, 5, 6]
    expect(oneWayAnova([a, b]).f).toBeCloseTo(welch(a, b, 0.95).t! ** 2, 12)
  })

  it('says why it cannot judge', () => {
    expect(oneWayAnova([[1, 2]]).reason).toContain('two groups')
    expect(oneWayAnova([[1], [2]])).toMatchObject({ f: null, reason: 'needs a group with at least two values' })
    expect(oneWayAnova([[1, 1], [2, 2]])).toMatchObject({ f: null, p: null, reason: 'no spread within the groups' })
    expect(() => oneWayAnova([[1, NaN], [2]])).toThrow('groups[0][1]')
  })
})
