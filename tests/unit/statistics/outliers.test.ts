import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { generalizedEsd, grubbs } from '#shared/statistics/outliers'

const values = fc.array(fc.integer({ min: -1000, max: 1000 }), { minLength: 4, maxLength: 30 })

describe('Grubbs', () => {
  it('points at the suspect of the asked end', () => {
    const data = [10, 11, 10.5, 10.2, 10.8, 10.4, 30, -5]
    expect(grubbs(data, 0.05, 'max').suspect).toBe(6)
    expect(grubbs(data, 0.05, 'min').suspect).toBe(7)
    expect(grubbs([10, 11, 10.5, 10.2, 10.8, 10.4, 30], 0.05, 'two-sided')).toMatchObject({ suspect: 6, outlier: true })
  })

  it('is not defined below three values or without spread', () => {
    expect(grubbs([1, 2], 0.05, 'max')).toMatchObject({ g: null, critical: null, outlier: false, reason: 'needs at least three values' })
    expect(grubbs([5, 5, 5], 0.05, 'max')).toMatchObject({ g: null, reason: 'all values are equal' })
    expect(grubbs([5, 5, 6], 0.05, 'max').reason).toContain('six values')
  })

  it('does not change with shift, scale and order', () => {
    fc.assert(fc.property(values, fc.integer({ min: -50, max: 50 }), fc.integer({ min: 1, max: 9 }), (list, shift, scale) => {
      fc.pre(new Set(list).size > 1)
      const plain = grubbs(list, 0.05, 'two-sided')
      expect(grubbs(list.map(x => scale * x + shift), 0.05, 'two-sided').g).toBeCloseTo(plain.g!, 9)
      expect(grubbs([...list].reverse(), 0.05, 'two-sided').g).toBeCloseTo(plain.g!, 12)
      expect(plain.g!).toBeLessThanOrEqual((list.length - 1) / Math.sqrt(list.length) + 1e-9)
    }))
  })
})

describe('generalized ESD', () => {
  it('takes the largest i that exceeds, not the first failure: two outliers hide each other from Grubbs', () => {
    const data = [...Array.from({ length: 28 }, (_, i) => 10 + ((i * 37) % 28) / 14), 25, 25.2]
    const { steps, count, outliers } = generalizedEsd(data, 5, 0.05)
    expect(steps).toHaveLength(5)
    expect(count).toBe(2)
    expect([...outliers].sort((a, b) => a - b)).toEqual([28, 29])
  })

  it('removes one of a tie at a time', () => {
    const { steps } = generalizedEsd([1, 2, 3, 4, 5, 6, 7, 50, 50], 2, 0.05)
    expect(steps.map(step => step.value)).toEqual([50, 50])
    expect(new Set(steps.map(step => step.at)).size).toBe(2)
  })

  it('stops where there is nothing left to judge', () => {
    expect(generalizedEsd([1, 2], 3, 0.05)).toMatchObject({ steps: [], count: 0, reason: 'needs at least three values' })
    expect(generalizedEsd([4, 4, 4, 4], 3, 0.05).reason).toBe('all values are equal')
    expect(generalizedEsd([4, 4, 4, 4, 9], 3, 0.05)).toMatchObject({ reason: 'the remaining values are all equal', steps: [{ at: 4 }] })
    expect(generalizedEsd([1, 2, 3, 4], 10, 0.05).steps).toHaveLength(2)
    expect(generalizedEsd([1, 2, 3, 4], 1, 0.05).reason).toContain('fifteen')
  })

  it('refuses a wrong argument', () => {
    expect(() => generalizedEsd([1, 2, NaN], 1, 0.05)).toThrow('values[2]')
    expect(() => generalizedEsd([1, 2, 3], 0, 0.05)).toThrow('most')
    expect(() => grubbs([1, 2, 3], 0, 'max')).toThrow('alpha')
  })
})
