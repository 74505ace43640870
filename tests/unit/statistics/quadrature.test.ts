import { describe, expect, it } from 'vitest'
import { gaussLegendre, integrate, panelRule } from '#shared/statistics/quadrature'

describe('quadrature', () => {
  it('is exact for polynomials up to twice its order less one', () => {
    for (const order of [1, 2, 5, 20, 100]) {
      const rule = gaussLegendre(order)
      expect(rule.weights.reduce((sum, w) => sum + w, 0)).toBeCloseTo(2, 13)
      expect(integrate(x => x ** (2 * order - 2), rule)).toBeCloseTo(2 / (2 * order - 1), 13)
      expect(integrate(x => x ** (2 * order - 1), rule)).toBeCloseTo(0, 13)
    }
  })

  it('goes over panels between breaks', () => {
    expect(integrate(Math.exp, panelRule([0, 0.3, 1], 3))).toBeCloseTo(Math.E - 1, 14)
    expect(integrate(() => 1, panelRule([2, 2, 5], 4))).toBeCloseTo(3, 13)
  })
})
