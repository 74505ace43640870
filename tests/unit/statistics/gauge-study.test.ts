import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gaugeStudy, type GaugeStudy } from '#shared/statistics/gauge-study'

const reading = fc.integer({ min: -50, max: 50 })
const readings = fc.array(fc.array(fc.tuple(reading, reading), { minLength: 3, maxLength: 3 }), { minLength: 4, maxLength: 4 })

describe('crossed gauge study', () => {
  it('splits the whole sum of squares, and does not change with a shift', () => {
    fc.assert(fc.property(readings, (data) => {
      const study = gaugeStudy(data, { poolAboveP: null }) as GaugeStudy
      const all = data.flat(2)
      const mean = all.reduce((sum, x) => sum + x, 0) / all.length
      const whole = all.reduce((sum, x) => sum + (x - mean) ** 2, 0)
      const parts = [study.part, study.operator, study.interaction, study.error].reduce((sum, r) => sum + r.sumOfSquares, 0)
      expect(parts).toBeCloseTo(whole, 6)
      const moved = gaugeStudy(data.map(p => p.map(o => o.map(x => x + 1000))), { poolAboveP: null }) as GaugeStudy
      expect(moved.components.gauge).toBeCloseTo(study.components.gauge, 6)
      const { gauge, part, total, repeatability, reproducibility } = study.components
      expect(gauge + part).toBeCloseTo(total, 9)
      expect(repeatability + reproducibility).toBeCloseTo(gauge, 9)
      expect(Math.min(part, reproducibility, repeatability)).toBeGreaterThanOrEqual(0)
    }))
  })

  it('names negative components', () => {
    // Operators agree exactly on average while the repeats scatter.
    const data = [[[1, 3], [3, 1]], [[11, 13], [13, 11]]]
    const study = gaugeStudy(data, { poolAboveP: null }) as GaugeStudy
    expect(study.negative).toContain('interaction')
    expect(study.components.interaction).toBe(0)
  })

  it('pools the interaction only when its p is above the setting', () => {
    const data = [[[1, 3], [3, 1.5]], [[11, 13], [13.5, 11]], [[6, 8], [7, 7.5]]]
    const kept = gaugeStudy(data, { poolAboveP: 1 }) as GaugeStudy
    const pooled = gaugeStudy(data, { poolAboveP: 0.25 }) as GaugeStudy
    expect([kept.pooled, pooled.pooled]).toEqual([false, true])
    const { interaction, error } = pooled
    expect(pooled.components.repeatability).toBeCloseTo((interaction.sumOfSquares + error.sumOfSquares) / (interaction.df + error.df), 12)
  })

  it('refuses an unbalanced or too small study in words', () => {
    expect(gaugeStudy([[[1, 2], [1]], [[1, 2], [1, 2]]], { poolAboveP: null }).reason).toContain('unbalanced')
    expect(gaugeStudy([[[1, 2]], [[1, 2]]], { poolAboveP: null }).reason).toContain('two operators')
    expect(gaugeStudy([], { poolAboveP: null }).reason).not.toBeNull()
  })

  it('has no categories when the gauge shows no spread', () => {
    const study = gaugeStudy([[[1, 1], [1, 1]], [[2, 2], [2, 2]]], { poolAboveP: 0.25 }) as GaugeStudy
    expect(study).toMatchObject({ distinctCategories: null, pooled: false, interaction: { f: null, p: null }, percentTolerance: null })
    expect(study.percentStudy!.part).toBeCloseTo(100, 10)
  })

  it('refuses what is not a number', () => {
    expect(() => gaugeStudy([[[NaN]]], { poolAboveP: null })).toThrow('readings[0][0][0]')
    expect(() => gaugeStudy([], { poolAboveP: 2 })).toThrow('poolAboveP')
  })
})
