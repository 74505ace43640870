import { describe, expect, it } from 'vitest'
import { cusumRunLength, ewmaRunLength, individualsRunLength, oneSidedCusumRunLength } from '#shared/statistics/average-run-length'

describe('average run lengths', () => {
  it('are those of the plain chart at lambda 1', () => {
    for (const shift of [0, 0.5, 1, 3]) {
      expect(ewmaRunLength({ lambda: 1, width: 3 }, shift)).toBeCloseTo(individualsRunLength(3, shift), 7)
    }
    expect(individualsRunLength(3, 0)).toBeCloseTo(370.4, 1)
  })

  it('print as in the tables of Lucas and Saccucci 1990: about 500 without a shift', () => {
    expect(ewmaRunLength({ lambda: 0.1, width: 2.814 }, 0)).toBeCloseTo(499.6, 0)
    expect(ewmaRunLength({ lambda: 0.4, width: 3.054 }, 0.5)).toBeCloseTo(71.2, 1)
  })

  it('print as in the tables of Lucas and Crosier 1982, with and without head start', () => {
    expect(cusumRunLength({ k: 0.5, h: 4 }, 0)).toBeCloseTo(168, 0)
    expect(cusumRunLength({ k: 0.5, h: 4 }, 0, 2)).toBeCloseTo(149, 0)
    expect(cusumRunLength({ k: 0.5, h: 5 }, 1, 2.5)).toBeCloseTo(6.35, 2)
    expect(oneSidedCusumRunLength({ k: 0.5, h: 4 }, 0)).toBeCloseTo(336, -1)
  })

  it('shorten with the shift and do not care for its sign', () => {
    const design = { k: 0.5, h: 5 }
    expect(cusumRunLength(design, 1)).toBeLessThan(cusumRunLength(design, 0.5))
    expect(cusumRunLength(design, -1)).toBeCloseTo(cusumRunLength(design, 1), 9)
    expect(ewmaRunLength({ lambda: 0.2, width: 3 }, -1)).toBeCloseTo(ewmaRunLength({ lambda: 0.2, width: 3 }, 1), 8)
  })

  it('refuse a wrong argument', () => {
    expect(() => ewmaRunLength({ lambda: 0.001, width: 3 }, 0)).toThrow('lambda')
    expect(() => cusumRunLength({ k: 0.5, h: 4 }, NaN)).toThrow('shift')
    expect(() => oneSidedCusumRunLength({ k: 0.5, h: 4 }, 0, 5)).toThrow('start')
    expect(() => individualsRunLength(0, 0)).toThrow('width')
  })
})
