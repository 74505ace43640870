import { describe, expect, it } from 'vitest'
import { solveLinear } from '#shared/statistics/linear-system'

describe('linear systems', () => {
  it('are solved, with rows exchanged where needed', () => {
    expect(solveLinear([[0, 2], [3, 1]], [4, 5])).toEqual([1, 2])
  })

  it('are refused when singular', () => {
    expect(() => solveLinear([[1, 2], [2, 4]], [1, 2])).toThrow(RangeError)
  })
})
