/** Decimal places of a display step: 0.1 has one, 1 has none, 0.05 has two. At most four. */
export function decimalsOf(resolution: number): number {
  for (let places = 0; places < 4; places++) {
    const scaled = resolution * 10 ** places
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9 && Math.round(scaled) > 0) return places
  }
  return 4
}

/** A value with the figures of the instrument that showed it: `98.4`, never `98.40000` or `98`. No negative zero. */
export function formatPercent(percent: number, resolution: number): string {
  const text = percent.toFixed(decimalsOf(resolution))
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text
}

/** An uncertainty: never finer than the value it belongs to, and at least one step. */
export function formatUncertainty(percent: number, resolution: number): string {
  const step = 10 ** -decimalsOf(resolution)
  return Math.max(step, Math.ceil(percent / step - 1e-9) * step).toFixed(decimalsOf(resolution))
}

/** A probability in words that don't claim more than it carries. */
export function formatProbability(probability: number): string {
  if (probability < 0.001) return 'below 0.1 %'
  if (probability > 0.999) return 'above 99.9 %'
  return `${(probability * 100).toFixed(probability < 0.1 || probability > 0.9 ? 1 : 0)} %`
}
