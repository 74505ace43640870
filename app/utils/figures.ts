/** A whole number with thin spaces between groups of three. */
export function countText(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+(?!\d))/g, '\u202f')
}

/** Bytes, or kB or MB of a thousand. */
export function byteText(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`
  if (bytes < 1_000_000) return `${(bytes / 1000).toFixed(1)} kB`
  return `${(bytes / 1_000_000).toFixed(1)} MB`
}

/** A number and its unit stay on one line. */
export function keepUnits(text: string): string {
  return text.replace(/(\d) (?=%|°C|kPa)/g, '$1\u00a0')
}
