/**
 * Numbers as the instrument would show them. The text is made without `Intl`, so that the server and
 * every browser write the same characters.
 */

/** Decimals of a display step: 0.1 → 1, 0.05 → 2, 1 → 0. At most 6. */
export function decimalsOf(resolution: number): number {
  for (let decimals = 0; decimals < 6; decimals++) {
    const scaled = resolution * 10 ** decimals
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9) return decimals
  }
  return 6
}

/** `value` to the decimals of `resolution`, with a true minus sign; never `-0.0`. */
export function figure(value: number, resolution: number): string {
  const decimals = decimalsOf(resolution)
  const text = value.toFixed(decimals)
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '\u2212')
}

/** A limit with at least the decimals of the instrument and never fewer than it was written with: 0.05 stays 0.05. */
export function limitFigure(limit: number, resolution: number): string {
  return limit.toFixed(Math.max(1, decimalsOf(resolution), decimalsOf(limit)))
}

/** An uncertainty or a limit of a coarse instrument is still worth one decimal: steps of 1 % have U = 0.6 %. */
export function uncertaintyFigure(uncertainty: number, resolution: number): string {
  return figure(uncertainty, Math.min(resolution, 0.1))
}

/** Spaces after a number so that its decimal point stands under the others'; for text in the mono face with white space kept. */
export function padToPoint(text: string, decimals: number): string {
  const point = text.indexOf('.')
  const own = point < 0 ? 0 : text.length - point
  const wanted = decimals === 0 ? 0 : decimals + 1
  return text + ' '.repeat(Math.max(0, wanted - own))
}

/** A probability as people read it; the ends are never claimed. */
export function probabilityText(probability: number): string {
  const percent = probability * 100
  if (percent < 0.1) return '< 0.1'
  if (percent > 99.9) return '> 99.9'
  return percent.toFixed(1)
}

/** A whole number with thin groups of three: 12 345. */
export function countText(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+(?!\d))/g, '\u202f')
}

/** Bytes in kB or MB of a thousand. */
export function byteText(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`
  if (bytes < 1_000_000) return `${(bytes / 1000).toFixed(1)} kB`
  return `${(bytes / 1_000_000).toFixed(1)} MB`
}
