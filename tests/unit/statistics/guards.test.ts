import { describe, expect, it } from 'vitest'
import {
  requireAllFinite, requireFinite, requireNotNegative, requireOpenUnit, requirePositive, requireSameLength, requireUnit, requireWhole,
} from '#shared/statistics/guards'

describe('guards of the statistics', () => {
  it('name the argument', () => {
    expect(() => requireFinite(NaN, 'target')).toThrow('target must be a finite number, not NaN')
    expect(() => requireAllFinite([1, -Infinity], 'values')).toThrow('values[1]')
    expect(() => requireOpenUnit(1, 'confidence')).toThrow('confidence')
    expect(() => requireUnit(-0.1, 'p')).toThrow('p must')
    expect(() => requirePositive(0, 'h')).toThrow('h must')
    expect(() => requireNotNegative(-1, 'k')).toThrow('k must')
    expect(() => requireWhole(2.5, 'n', 0)).toThrow('n must be a whole number of 0 or more')
    expect(() => requireWhole(7, 'n', 2, 6)).toThrow('n must be a whole number from 2 to 6')
    expect(() => requireSameLength([1], 'x', [], 'y')).toThrow('x and y')
  })

  it('refuse NaN everywhere', () => {
    for (const guard of [requireFinite, requireOpenUnit, requireUnit, requirePositive, requireNotNegative]) {
      expect(() => guard(NaN, 'it')).toThrow(RangeError)
    }
    expect(() => requireWhole(NaN, 'it', 0)).toThrow(RangeError)
  })

  it('let good arguments through', () => {
    requireFinite(-1, 'a')
    requireAllFinite([], 'a')
    requireOpenUnit(0.5, 'a')
    requireUnit(0, 'a')
    requireUnit(1, 'a')
    requirePositive(1e-300, 'a')
    requireNotNegative(0, 'a')
    requireWhole(6, 'a', 2, 6)
    requireSameLength([1], 'a', [2], 'b')
  })
})
