import type { Substance } from '#shared/refrigerants/designations'

/** Reference to the drawn tile; the tiles stand once in the page (SubstancePatterns.vue). */
export function patternFill(substance: Substance | 'air'): string {
  return `url(#substance-${substance})`
}
