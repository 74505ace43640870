import { describe, expect, it } from 'vitest'
import { solveLinear } from '#shared/statistics/linear-system'

describe('linear systems', () => {
  it('are solved, with rows exchanged where needed', () => {
    expect(solveLinear([[0, 2], [3, 1]], [4, 5])).toEqual([1, 2])
  })

  it('are solved whatever the order of the rows', () => {
    const rows = [[2, 1, -1], [-3, -1, 2], [-2, 1, 2]]
    const right = [8, -11, -3]
    for (const order of [[0, 1, 2], [2, 0, 1], [1, 2, 0]]) {
      expect(solveLinear(order.map(i => rows[i]!), order.map(i => right[i]!))).toEqual([2, 3, -1].map(x => expect.closeTo(x, 12)))
    }
  })

  it('are refused when singular', () => {
    expect(() => solveLinear([[1, 2], [2, 4]], [1, 2])).toThrow(RangeError)
  })
})
