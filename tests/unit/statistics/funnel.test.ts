import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { funnelLimits, funnelPlot } from '#shared/statistics/funnel'

const centre = fc.double({ min: 0.01, max: 0.99, noNaN: true })
const size = fc.integer({ min: 1, max: 400 })

/** P(R >= x) summed term by term. */
function upperTail(x: number, n: number, share: number): number {
  let term = (1 - share) ** n
  let below = 0
  for (let r = 0; r < x; r += 1) {
    below += term
    term *= (n - r) / (r + 1) * share / (1 - share)
  }
  return 1 - below
}

describe('funnel limits', () => {
  it('hold the centre or the nearest share, widen with the coverage and mirror', () => {
    fc.assert(fc.property(centre, size, (share, n) => {
      const inner = funnelLimits(share, n, 0.95)
      const outer = funnelLimits(share, n, 0.998)
      expect(outer.lower!).toBeLessThanOrEqual(inner.lower!)
      expect(outer.upper!).toBeGreaterThanOrEqual(inner.upper!)
      expect(inner.lower!).toBeLessThanOrEqual(share)
      expect(inner.upper!).toBeGreaterThanOrEqual(share)
      expect(funnelLimits(1 - share, n, 0.95).lower!).toBeCloseTo(1 - inner.upper!, 9)
    }))
  })

  it('put a count outside exactly when its tail is below the level', () => {
    fc.assert(fc.property(fc.double({ min: 0.05, max: 0.6, noNaN: true }), fc.integer({ min: 1, max: 60 }), (share, n) => {
      const { upper } = funnelLimits(share, n, 0.95)
      for (let x = 0; x <= n; x += 1) {
        const tail = upperTail(x, n, share)
        if (Math.abs(tail - 0.025) > 1e-9) expect(x / n > upper! + 1e-12).toBe(tail < 0.025)
      }
    }), { numRuns: 40 })
  })

  it('narrow to the normal limits with n', () => {
    const { lower, upper } = funnelLimits(0.2, 100_000, 0.95)
    const half = 1.959964 * Math.sqrt(0.16 / 100_000)
    expect(lower).toBeCloseTo(0.2 - half, 4)
    expect(upper).toBeCloseTo(0.2 + half, 4)
  })

  it('are refused with a reason', () => {
    expect(funnelLimits(0.1, 0, 0.95).reason).toContain('empty')
    expect(funnelLimits(0, 10, 0.95).reason).toContain('none')
    expect(() => funnelLimits(1.1, 10, 0.95)).toThrow('centre')
  })
})

describe('funnel plot', () => {
  it('places groups, and never one vehicle alone outside', () => {
    const { centre: all, points } = funnelPlot([
      { name: 'one vehicle', x: 1, n: 1 },
      { name: 'nothing', x: 0, n: 0 },
      { name: 'many', x: 60, n: 100 },
      { name: 'usual', x: 20, n: 100 },
      { name: 'few', x: 4, n: 100 },
    ])
    expect(all).toBeCloseTo(85 / 301, 14)
    expect(points.map(point => point.place)).toEqual(['inside', 'not enough data to tell', 'outside 99.8 %', 'inside', 'outside 99.8 %'])
    expect(points.map(point => point.side)).toEqual([null, null, 'above', null, 'below'])
  })

  it('has nothing to show where nothing was found', () => {
    expect(funnelPlot([{ name: 'a', x: 0, n: 5 }])).toMatchObject({ centre: 0, reason: 'none in any group', points: [{ place: 'not enough data to tell' }] })
    expect(funnelPlot([])).toEqual({ centre: null, points: [], reason: 'no values' })
    expect(() => funnelPlot([{ name: 'a', x: 6, n: 5 }])).toThrow('groups[0].x')
  })
})
