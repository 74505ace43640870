import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bartlett, brownForsythe, standardDeviationTest } from '#shared/statistics/variance-tests'

const group = fc.array(fc.integer({ min: -100, max: 100 }), { minLength: 3, maxLength: 9 })

describe('tests of spread', () => {
  it('see a batch that scatters more', () => {
    const calm = Array.from({ length: 20 }, (_, i) => (i * 7) % 20)
    const wild = calm.map(x => 10 * x)
    expect(bartlett([calm, wild]).p!).toBeLessThan(1e-6)
    expect(brownForsythe([calm, wild]).p!).toBeLessThan(1e-3)
    expect(bartlett([calm, calm.map(x => x + 5)]).statistic).toBeCloseTo(0, 12)
  })

  it('do not change with shifts of single groups nor a common scale', () => {
    fc.assert(fc.property(group, group, fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 9 }), (a, b, shift, scale) => {
      const plain = bartlett([a, b])
      fc.pre(plain.statistic !== null)
      expect(bartlett([b.map(x => scale * x), a.map(x => scale * (x + shift))]).statistic!).toBeCloseTo(plain.statistic!, 8)
      const medians = brownForsythe([a, b])
      fc.pre(medians.statistic !== null)
      expect(brownForsythe([b.map(x => scale * x), a.map(x => scale * (x + shift))]).statistic!).toBeCloseTo(medians.statistic!, 8)
    }))
  })

  it('send a batch without spread to the test with medians', () => {
    expect(bartlett([[1, 1, 1], [1, 2, 3]])).toMatchObject({ statistic: null, p: null, reason: expect.stringContaining('medians') })
    expect(brownForsythe([[1, 1, 1], [1, 2, 4]]).statistic).toBeGreaterThan(0)
    expect(brownForsythe([[1, 1], [2, 2]]).reason).toBe('no spread within the groups')
    expect(bartlett([[1, 2]]).reason).toContain('two groups')
    expect(brownForsythe([[1], [2, 3]]).reason).toContain('two values')
  })

  it('take groups of two, not of one', () => {
    expect(bartlett([[1, 2], [1, 4]]).statistic).toBeGreaterThan(0)
    expect(bartlett([[1], [1, 4]]).reason).toContain('two values')
  })

  it('judge a standard deviation against a given one', () => {
    const { statistic, df, pLower, pUpper, pTwoSided } = standardDeviationTest([1, 2, 3], 1)
    expect(statistic).toBeCloseTo(2, 14)
    expect(df).toBe(2)
    expect(pLower).toBeCloseTo(1 - Math.exp(-1), 14)
    expect(pUpper).toBeCloseTo(Math.exp(-1), 14)
    expect(pTwoSided).toBeCloseTo(2 * Math.exp(-1), 14)
    expect(standardDeviationTest([1], 1).reason).toContain('two values')
    expect(() => standardDeviationTest([1, 2], 0)).toThrow('against')
  })
})
