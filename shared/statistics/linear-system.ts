/**
 * Solution of a square system of linear equations by elimination with row exchange.
 * @throws RangeError when the matrix is singular.
 */
export function solveLinear(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const n = right.length
  const rows = matrix.map((row, i) => [...row, right[i]!])
  for (let k = 0; k < n; k += 1) {
    let pivot = k
    for (let i = k + 1; i < n; i += 1) {
      if (Math.abs(rows[i]![k]!) > Math.abs(rows[pivot]![k]!)) pivot = i
    }
    const top = rows[pivot]!
    if (top[k] === 0) throw new RangeError('the matrix must not be singular')
    rows[pivot] = rows[k]!
    rows[k] = top
    for (let i = k + 1; i < n; i += 1) {
      const row = rows[i]!
      const factor = row[k]! / top[k]!
      if (factor === 0) continue
      for (let j = k; j <= n; j += 1) row[j]! -= factor * top[j]!
    }
  }
  const solution = new Array<number>(n)
  for (let i = n - 1; i >= 0; i -= 1) {
    const row = rows[i]!
    let rest = row[n]!
    for (let j = i + 1; j < n; j += 1) rest -= row[j]! * solution[j]!
    solution[i] = rest / row[i]!
  }
  return solution
}
