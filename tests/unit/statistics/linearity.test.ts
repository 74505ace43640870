import { describe, expect, it } from 'vitest'
import { linearity, linearityOfBias } from '#shared/statistics/linearity'

describe('linearity', () => {
  it('is the line of bias on reference, from readings or biases alike', () => {
    const reference = [10, 20, 30]
    const readings = [[10.5, 10.7], [21, 21.2], [31.5, 31.6]]
    const found = linearity(reference, readings)
    const same = linearityOfBias(reference, [[10.5 - 10, 10.7 - 10], [21 - 20, 21.2 - 20], [31.5 - 30, 31.6 - 30]])
    expect(found).toEqual(same)
    expect(found.levels[1]!.meanBias).toBeCloseTo(1.1, 12)
    expect(found.line!.slope).toBeCloseTo(0.0475, 12)
    expect(found.lackOfFit!.dfPure).toBe(3)
  })

  it('says nothing below three levels that were measured', () => {
    expect(linearity([1, 2], [[1], [2]])).toMatchObject({ line: null, lackOfFit: null, reason: expect.stringContaining('three levels') })
    const found = linearity([1, 2, 3], [[1], [2], []])
    expect(found.line).toBeNull()
    expect(found.levels[2]).toEqual({ reference: 3, n: 0, meanBias: null })
  })

  it('refuses what does not fit', () => {
    expect(() => linearity([1, 2], [[1]])).toThrow('same length')
    expect(() => linearity([1], [[NaN]])).toThrow('readings[0][0]')
  })
})
