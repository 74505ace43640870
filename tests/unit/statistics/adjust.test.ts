import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { benjaminiHochberg, holm } from '#shared/statistics/adjust'

const ps = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 12 })

describe('p values of many comparisons', () => {
  it('never fall, never pass 1, keep the order, and Holm is the stricter', () => {
    fc.assert(fc.property(ps, (p) => {
      const strict = holm(p)
      const mild = benjaminiHochberg(p)
      p.forEach((value, i) => {
        expect(mild[i]).toBeGreaterThanOrEqual(value - 1e-15)
        expect(strict[i]).toBeGreaterThanOrEqual(mild[i]! - 1e-15)
        expect(strict[i]).toBeLessThanOrEqual(1)
        p.forEach((other, j) => {
          if (value < other) {
            expect(strict[i]).toBeLessThanOrEqual(strict[j]!)
            expect(mild[i]).toBeLessThanOrEqual(mild[j]!)
          }
        })
      })
    }))
  })

  it('are unchanged when there is only one, and empty when there is none', () => {
    expect(holm([0.03])).toEqual([0.03])
    expect(benjaminiHochberg([0.03])).toEqual([0.03])
    expect(holm([])).toEqual([])
  })

  it('refuse what is no probability', () => {
    expect(() => holm([0.1, 1.2])).toThrow('p[1]')
    expect(() => benjaminiHochberg([NaN])).toThrow('p[0]')
  })
})
