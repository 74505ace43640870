/** How a line of CSV leaves the quotes (RFC 4180): a quote opens only at the beginning of a field. */
export type QuoteState = 'closed' | 'open' | 'broken'

/**
 * Follows the quotes of one line. `broken`: a quote inside a field without quotes, or text after the
 * closing quote.
 * @param inside whether the line begins inside a quoted field
 */
export function followQuotes(text: string, delimiter: string, inside: boolean): QuoteState {
  let at = 0
  for (;;) {
    if (!inside) {
      const quote = text.indexOf('"', at)
      if (quote < 0) return 'closed'
      if (quote > 0 && text[quote - 1] !== delimiter) return 'broken'
      at = quote + 1
      inside = true
    }
    const quote = text.indexOf('"', at)
    if (quote < 0) return 'open'
    const next = text[quote + 1]
    at = quote + 2
    if (next === '"') continue
    if (next === undefined) return 'closed'
    if (next !== delimiter) return 'broken'
    inside = false
  }
}
