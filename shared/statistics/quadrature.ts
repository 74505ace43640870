/** Points and weights of a quadrature rule on an interval. */
export interface Rule {
  points: readonly number[]
  weights: readonly number[]
}

const rules = new Map<number, Rule>()

/**
 * Gauss-Legendre rule of `order` points on -1 to 1, the zeros of the Legendre polynomial by Newton's method.
 * Source: DLMF 3.5(v).
 */
export function gaussLegendre(order: number): Rule {
  const known = rules.get(order)
  if (known) return known
  const points = new Array<number>(order)
  const weights = new Array<number>(order)
  for (let i = 0; i < (order + 1) / 2; i += 1) {
    let x = Math.cos(Math.PI * (i + 0.75) / (order + 0.5))
    let slope = 1
    for (let turn = 0; turn < 100; turn += 1) {
      let previous = 1
      let current = x
      for (let k = 2; k <= order; k += 1) {
        const next = ((2 * k - 1) * x * current - (k - 1) * previous) / k
        previous = current
        current = next
      }
      slope = order * (x * current - previous) / (x * x - 1)
      const step = current / slope
      x -= step
      if (Math.abs(step) < 1e-15) break
    }
    points[i] = -x
    points[order - 1 - i] = x
    weights[i] = 2 / ((1 - x * x) * slope * slope)
    weights[order - 1 - i] = weights[i]!
  }
  const rule = { points, weights }
  rules.set(order, rule)
  return rule
}

/** Composite rule over the stretches between ascending `breaks`, each cut into `panels` parts of 20 points. */
export function panelRule(breaks: readonly number[], panels: number): Rule {
  const base = gaussLegendre(20)
  const points: number[] = []
  const weights: number[] = []
  for (let s = 0; s + 1 < breaks.length; s += 1) {
    const width = (breaks[s + 1]! - breaks[s]!) / panels
    if (!(width > 0)) continue
    for (let k = 0; k < panels; k += 1) {
      const centre = breaks[s]! + (k + 0.5) * width
      base.points.forEach((point, i) => {
        points.push(centre + point * width / 2)
        weights.push(base.weights[i]! * width / 2)
      })
    }
  }
  return { points, weights }
}

/** Integral of `f` with a rule. */
export function integrate(f: (x: number) => number, rule: Rule): number {
  let sum = 0
  rule.points.forEach((point, i) => {
    sum += rule.weights[i]! * f(point)
  })
  return sum
}
