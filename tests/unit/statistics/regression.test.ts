import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { lackOfFit, straightLine, type StraightLine } from '#shared/statistics/regression'

const points = fc.array(fc.tuple(fc.integer({ min: -50, max: 50 }), fc.integer({ min: -50, max: 50 })), { minLength: 4, maxLength: 20 })

describe('straight line', () => {
  it('follows a shift and scale of y, and its residuals sum to 0', () => {
    fc.assert(fc.property(points, fc.integer({ min: -9, max: 9 }), fc.integer({ min: 1, max: 9 }), (list, shift, scale) => {
      const x = list.map(([a]) => a)
      const y = list.map(([, b]) => b)
      fc.pre(new Set(x).size > 1)
      const plain = straightLine(x, y) as StraightLine
      const moved = straightLine(x, y.map(b => scale * b + shift)) as StraightLine
      expect(moved.slope).toBeCloseTo(scale * plain.slope, 9)
      expect(moved.intercept).toBeCloseTo(scale * plain.intercept + shift, 8)
      expect(plain.residuals.reduce((sum, r) => sum + r, 0)).toBeCloseTo(0, 9)
      if (plain.rSquared !== null) expect(plain.rSquared).toBeLessThanOrEqual(1)
    }))
  })

  it('keeps its digits far from zero', () => {
    const line = straightLine([1e9, 1e9 + 1, 1e9 + 2, 1e9 + 3], [5, 7, 9, 11]) as StraightLine
    expect(line.slope).toBe(2)
    expect(line.reason).toBe('the points lie exactly on the line')
    expect(line.slopeP).toBeNull()
  })

  it('is refused with a reason', () => {
    expect(straightLine([1], [2])).toMatchObject({ slope: null, reason: expect.stringContaining('two points') })
    expect(straightLine([3, 3], [1, 2])).toMatchObject({ slope: null, reason: 'all x are equal' })
    expect(straightLine([1, 2], [1, 2])).toMatchObject({ slope: 1, slopeStandardError: null, reason: expect.stringContaining('two points') })
    expect(() => straightLine([1, 2], [1])).toThrow('same length')
    expect(() => straightLine([1, NaN], [1, 2])).toThrow('x[1]')
  })
})

describe('lack of fit', () => {
  it('finds a curve that R squared hides', () => {
    const x = [1, 1, 2, 2, 3, 3, 4, 4, 5, 5]
    const y = x.map((value, i) => value + 0.01 * value * value + (i % 2) * 0.001)
    expect((straightLine(x, y) as StraightLine).rSquared!).toBeGreaterThan(0.999)
    expect(lackOfFit(x, y).p!).toBeLessThan(1e-4)
  })

  it('leaves a true line alone', () => {
    const x = [1, 1, 2, 2, 3, 3]
    expect(lackOfFit(x, [1, 1.2, 2, 2.2, 3, 3.2]).f).toBeCloseTo(0, 12)
  })

  it('needs levels, repeats and spread', () => {
    expect(lackOfFit([1, 1, 2, 2], [1, 2, 3, 4]).reason).toContain('three levels')
    expect(lackOfFit([1, 2, 3], [1, 2, 4]).reason).toContain('repeats')
    expect(lackOfFit([1, 1, 2, 3], [1, 1, 2, 4])).toMatchObject({ f: null, reason: 'the repeats have no spread' })
  })
})
