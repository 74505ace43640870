import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compareBatches, kruskalWallis, welch } from '#shared/statistics/compare'

const values = fc.array(fc.integer({ min: 0, max: 50 }), { minLength: 2, maxLength: 12 })

describe('Welch', () => {
  it('turns the sign when exchanged, ignores order and shift', () => {
    fc.assert(fc.property(values, values, fc.integer({ min: -20, max: 20 }), (a, b, shift) => {
      const there = welch(a, b, 0.95)
      fc.pre(there.t !== null)
      const back = welch(b.map(x => x + shift).reverse(), a.map(x => x + shift), 0.95)
      expect(back.t!).toBeCloseTo(-there.t!, 9)
      expect(back.p!).toBeCloseTo(there.p!, 9)
      expect(there.p! <= 0.05).toBe(there.interval.lower! > 0 || there.interval.upper! < 0)
    }))
  })

  it('gives the effect in corrected standard deviations', () => {
    // Difference 3, pooled sd 1, df 4; correction Γ(2)/(√2 Γ(1.5)) = 0.79788.
    expect(welch([4, 5, 6], [1, 2, 3], 0.95).effect).toBeCloseTo(3 * 0.7978845608, 9)
  })

  it('is refused with a reason', () => {
    expect(welch([1], [1, 2], 0.95)).toMatchObject({ t: null, p: null, reason: 'each batch needs at least two values' })
    expect(welch([], [1, 2], 0.95).difference).toBeNull()
    expect(welch([1, 1], [2, 2], 0.95)).toMatchObject({ difference: -1, t: null, reason: 'neither batch has any spread' })
    expect(() => welch([1, NaN], [2, 3], 0.95)).toThrow('first[1]')
  })
})

describe('Kruskal-Wallis', () => {
  it('knows only ranks: any rising change of scale leaves it alone', () => {
    fc.assert(fc.property(values, values, values, (a, b, c) => {
      const plain = kruskalWallis([a, b, c])
      fc.pre(plain.h !== null)
      expect(kruskalWallis([c, a, b].map(list => list.map(x => Math.exp(x / 10)))).h).toBeCloseTo(plain.h!, 9)
      expect(plain.effect!).toBeGreaterThanOrEqual(0)
      expect(plain.effect!).toBeLessThanOrEqual(1)
    }))
  })

  it('is refused with a reason', () => {
    expect(kruskalWallis([[1, 2]]).reason).toContain('two groups')
    expect(kruskalWallis([[], [1]]).reason).toBe('a group is empty')
    expect(kruskalWallis([[3, 3], [3]])).toMatchObject({ h: null, p: null, reason: 'all values are equal' })
    expect(kruskalWallis([[1, 2], [3, 4]]).reason).toContain('rough')
  })
})

describe('comparison of batches', () => {
  const high = { name: 'Lot A', values: [99.5, 99.6, 99.4, 99.7, 99.5, 99.6] }
  const low = { name: 'Lot B', values: [97.5, 97.6, 97.4, 97.7, 97.5, 97.6] }
  const middle = { name: 'Lot C', values: [99.5, 99.4, 99.6, 99.6, 99.7, 99.5] }

  it('says in words which batch is higher and by how much', () => {
    const { pairs, found, words } = compareBatches([high, low, middle], 0.95)
    expect(found).toBe('difference')
    expect(pairs.map(pair => pair.found)).toEqual(['difference', 'no difference shown', 'difference'])
    expect(pairs[0]!.words).toBe('Lot A is higher than Lot B on average, a large difference beside the spread.')
    expect(pairs[1]!.words).toContain('does not prove')
    expect(words).toBe('The batches differ: 2 of 3 pairs.')
    expect(pairs[0]!.adjustedP!).toBeGreaterThanOrEqual(pairs[0]!.welch.p!)
  })

  it('says when there is not enough data to tell', () => {
    const { pairs, found } = compareBatches([{ name: 'one', values: [5] }, { name: 'two', values: [5] }], 0.95)
    expect(found).toBe('not enough data to tell')
    expect(pairs[0]!.words).toContain('not enough data to tell')
    expect(pairs[0]!.adjustedP).toBeNull()
  })

  it('takes two to six batches', () => {
    expect(() => compareBatches([high], 0.95)).toThrow('number of batches')
    expect(() => compareBatches(Array.from({ length: 7 }, () => high), 0.95)).toThrow(RangeError)
  })
})
