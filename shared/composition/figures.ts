import { decimalsOf, formatPercent } from './format'

/** A number with the figures of its display step and a true minus sign: `98.4`, `−3.0`. */
export function figure(value: number, resolution: number): string {
  return formatPercent(value, resolution).replace('-', '\u2212')
}

/** A limit with at least the decimals of the instrument and never fewer than it was written with: 0.05 stays 0.05. */
export function limitFigure(limit: number, resolution: number): string {
  return limit.toFixed(Math.max(1, decimalsOf(resolution), decimalsOf(limit)))
}

/** Spaces after a number so that its decimal point stands under the others'; for text in the mono face with white space kept. */
export function padToPoint(text: string, decimals: number): string {
  const point = text.indexOf('.')
  const own = point < 0 ? 0 : text.length - point
  const wanted = decimals === 0 ? 0 : decimals + 1
  return text + ' '.repeat(Math.max(0, wanted - own))
}
