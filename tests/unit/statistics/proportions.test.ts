import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { clopperPearsonInterval, compareTwoShares, wilsonInterval } from '#shared/statistics/proportions'

const share = fc.integer({ min: 1, max: 2000 }).chain(n => fc.record({ x: fc.integer({ min: 0, max: n }), n: fc.constant(n) }))
const confidence = fc.double({ min: 0.5, max: 0.999, noNaN: true })

describe('intervals of a share', () => {
  it('hold the share, lie inside 0 to 1, and mirror', () => {
    fc.assert(fc.property(share, confidence, ({ x, n }, c) => {
      for (const make of [wilsonInterval, clopperPearsonInterval]) {
        const { lower, upper } = make(x, n, c)
        expect(lower!).toBeLessThanOrEqual(x / n + 1e-15)
        expect(upper!).toBeGreaterThanOrEqual(x / n - 1e-15)
        expect(lower!).toBeGreaterThanOrEqual(0)
        expect(upper!).toBeLessThanOrEqual(1)
        expect(make(n - x, n, c).lower!).toBeCloseTo(1 - upper!, 11)
      }
    }))
  })

  it('are exact at the ends', () => {
    for (const make of [wilsonInterval, clopperPearsonInterval]) {
      expect(make(0, 7, 0.95).lower).toBe(0)
      expect(make(7, 7, 0.95).upper).toBe(1)
      expect(make(0, 0, 0.95)).toEqual({ lower: null, upper: null, reason: 'no values' })
    }
  })

  it('are those of Wilson: the score test at each end just reaches its level', () => {
    fc.assert(fc.property(share, ({ x, n }) => {
      const { upper } = wilsonInterval(x, n, 0.95)
      fc.pre(x < n)
      expect((upper! - x / n) / Math.sqrt(upper! * (1 - upper!) / n)).toBeCloseTo(1.959963984540054, 6)
    }))
  })

  it('refuse counts that do not fit', () => {
    expect(() => wilsonInterval(3, 2, 0.95)).toThrow('x must')
    expect(() => wilsonInterval(0.5, 2, 0.95)).toThrow('x must')
    expect(() => clopperPearsonInterval(-1, 2, 0.95)).toThrow('x must')
    expect(() => wilsonInterval(1, NaN, 0.95)).toThrow('n must')
  })
})

describe('two shares', () => {
  it('give the published interval of the difference, Newcombe 1998 table II (a): 56/70 and 48/80', () => {
    const found = compareTwoShares({ x: 56, n: 70 }, { x: 48, n: 80 }, 0.95)
    expect(found.interval.lower).toBeCloseTo(0.0524, 4)
    expect(found.interval.upper).toBeCloseTo(0.3339, 4)
    expect(found.z! ** 2).toBeCloseTo(7.0234, 4)
    // Twice the normal tail beyond 2.65017.
    expect(found.p).toBeCloseTo(0.008045, 6)
  })

  it('turn the sign when exchanged', () => {
    fc.assert(fc.property(share, share, (a, b) => {
      const there = compareTwoShares(a, b, 0.95)
      const back = compareTwoShares(b, a, 0.95)
      expect(back.difference!).toBeCloseTo(-there.difference!, 14)
      expect(back.p!).toBeCloseTo(there.p!, 12)
      expect(back.interval.lower!).toBeCloseTo(-there.interval.upper!, 12)
      expect(there.interval.lower!).toBeLessThanOrEqual(there.difference! + 1e-12)
    }))
  })

  it('say when little can be told', () => {
    expect(compareTwoShares({ x: 0, n: 10 }, { x: 0, n: 20 }, 0.95)).toMatchObject({ z: 0, p: 1, dependable: false, reason: 'none in either group' })
    expect(compareTwoShares({ x: 0, n: 0 }, { x: 1, n: 20 }, 0.95)).toMatchObject({ difference: null, p: null, reason: 'a group is empty' })
    expect(compareTwoShares({ x: 1, n: 10 }, { x: 2, n: 10 }, 0.95).dependable).toBe(false)
    expect(compareTwoShares({ x: 10, n: 40 }, { x: 20, n: 40 }, 0.95).dependable).toBe(true)
  })
})
