/**
 * Root of a continuous function inside a bracket.
 * Source: Brent 1973, Algorithms for Minimization without Derivatives, chapter 4 (from memory).
 * @param f function whose values at `low` and `high` differ in sign (or are zero there)
 * @throws RangeError when the ends do not enclose a root.
 */
export function findRoot(f: (x: number) => number, low: number, high: number, tolerance = 1e-15): number {
  let a = low
  let b = high
  let fa = f(a)
  let fb = f(b)
  if (fa === 0) return a
  if (fb === 0) return b
  if (!(fa < 0 !== fb < 0) || Number.isNaN(fa) || Number.isNaN(fb)) throw new RangeError('the bracket must enclose a root')
  let c = a
  let fc = fa
  let step = b - a
  let previous = step
  for (let i = 0; i < 400; i += 1) {
    if (fb < 0 === fc < 0) {
      c = a
      fc = fa
      step = b - a
      previous = step
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b
      b = c
      c = a
      fa = fb
      fb = fc
      fc = fa
    }
    const limit = 2 * Number.EPSILON * Math.abs(b) + tolerance * 0.5
    const half = (c - b) / 2
    if (Math.abs(half) <= limit || fb === 0) return b
    if (Math.abs(previous) >= limit && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa
      let p: number
      let q: number
      if (a === c) {
        p = 2 * half * s
        q = 1 - s
      }
      else {
        const qa = fa / fc
        const r = fb / fc
        p = s * (2 * half * qa * (qa - r) - (b - a) * (r - 1))
        q = (qa - 1) * (r - 1) * (s - 1)
      }
      if (p > 0) q = -q
      p = Math.abs(p)
      if (2 * p < Math.min(3 * half * q - Math.abs(limit * q), Math.abs(previous * q))) {
        previous = step
        step = p / q
      }
      else {
        step = half
        previous = half
      }
    }
    else {
      step = half
      previous = half
    }
    a = b
    fa = fb
    b += Math.abs(step) > limit ? step : half > 0 ? limit : -limit
    fb = f(b)
  }
  return b
}

/**
 * Root of an increasing function, searched outwards from `start` in steps that double.
 * @throws RangeError when no sign change is found within `limit` of the start.
 */
export function findIncreasingRoot(f: (x: number) => number, start: number, firstStep: number, limit: number): number {
  const atStart = f(start)
  if (atStart === 0) return start
  const direction = atStart < 0 ? 1 : -1
  let inner = start
  for (let step = firstStep; ; step *= 2) {
    const outer = start + direction * Math.min(step, limit)
    const value = f(outer)
    if (value === 0) return outer
    if (value < 0 !== atStart < 0) return direction > 0 ? findRoot(f, inner, outer) : findRoot(f, outer, inner)
    if (step >= limit) throw new RangeError('no root within the searched range')
    inner = outer
  }
}
