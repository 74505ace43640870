import { describe, expect, it } from 'vitest'
import { c4, controlConstants } from '#shared/statistics/control-constants'

describe('control chart constants', () => {
  it('know the closed forms of two and three values', () => {
    expect(controlConstants(2).d2).toBeCloseTo(2 / Math.sqrt(Math.PI), 11)
    expect(controlConstants(2).d3).toBeCloseTo(Math.sqrt(2 - 4 / Math.PI), 11)
    expect(controlConstants(3).d2).toBeCloseTo(3 / Math.sqrt(Math.PI), 11)
    expect(c4(2)).toBeCloseTo(Math.sqrt(2 / Math.PI), 14)
  })

  it('print as the tables of ASTM E2587 and ISO 7870-2', () => {
    const seven = controlConstants(7)
    const printed = (value: number): string => value.toFixed(3)
    expect([seven.d2, seven.d3, seven.A2, seven.A3, seven.B3, seven.B4, seven.D3, seven.D4].map(printed))
      .toEqual(['2.704', '0.833', '0.419', '1.182', '0.118', '1.882', '0.076', '1.924'])
    // The e-Handbook prints 2.115; exact is 2.1145.
    expect(controlConstants(5).D4.toFixed(4)).toBe('2.1145')
  })

  it('run smoothly: d2 rises, d3 falls, c4 nears 1, nothing is negative', () => {
    for (let n = 3; n <= 25; n += 1) {
      const [before, here] = [controlConstants(n - 1), controlConstants(n)]
      expect(here.d2).toBeGreaterThan(before.d2)
      if (n > 3) expect(here.d3).toBeLessThan(before.d3)
      expect(here.c4).toBeGreaterThan(before.c4)
      expect(here.c4).toBeLessThan(1)
      expect(Math.min(here.B3, here.D3)).toBeGreaterThanOrEqual(0)
    }
    expect(controlConstants(5).B3).toBe(0)
    expect(controlConstants(6).D3).toBe(0)
  })

  it('refuse other sizes', () => {
    for (const n of [1, 2.5, 101, NaN]) expect(() => controlConstants(n)).toThrow('n must')
  })
})
