import { describe, expect, it } from 'vitest'
import { findIncreasingRoot, findRoot } from '#shared/statistics/roots'

describe('roots', () => {
  it('are found inside a bracket', () => {
    expect(findRoot(x => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15)
    expect(findRoot(x => x ** 9 - 1e-9, 0, 5)).toBeCloseTo(0.1, 12)
    expect(findRoot(x => x, 0, 1)).toBe(0)
  })

  it('take few steps on a smooth function', () => {
    for (const [f, low, high] of [[(x: number) => Math.exp(x) - 5, -10, 10], [(x: number) => x ** 3 - 2, 0, 4]] as const) {
      let calls = 0
      findRoot((x) => {
        calls += 1
        return f(x)
      }, low, high)
      expect(calls).toBeLessThan(18)
    }
  })

  it('are searched outwards', () => {
    expect(findIncreasingRoot(x => x - 1000, 0, 1, 1e6)).toBeCloseTo(1000, 10)
    expect(findIncreasingRoot(x => x + 1000, 0, 1, 1e6)).toBeCloseTo(-1000, 10)
  })

  it('are refused where there are none', () => {
    expect(() => findRoot(x => x * x + 1, -1, 1)).toThrow(RangeError)
    expect(() => findRoot(() => NaN, -1, 1)).toThrow(RangeError)
    expect(() => findIncreasingRoot(() => -1, 0, 1, 100)).toThrow(RangeError)
  })
})
