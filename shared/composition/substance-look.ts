import type { Substance } from '../refrigerants/designations'

/**
 * Colour and pattern of each substance. Hues are the nine of the "muted" scheme and its pale grey of
 * P. Tol, "Colour Schemes", SRON/EPS/TN/09-002, issue 3.2 (2021), made for colour-blind readers.
 * Hydrocarbons share one hue and differ by pattern. Every pattern is used once, so that a bar can be
 * told without its colour. `mark` draws an 8 × 8 tile in `ink`, chosen to stand out from `ground` in
 * both themes.
 */
export interface SubstanceLook {
  ground: string
  ink: '#FFFFFF' | '#0F1C24'
  /** What a person would call the pattern; stands in the table beside the drawing. */
  pattern: string
  mark: string
  /** The mark is filled instead of drawn with a line. */
  filled?: boolean
}

const WHITE = '#FFFFFF'
const BLACK = '#0F1C24'

export const SUBSTANCE_LOOKS: Record<Substance, SubstanceLook> = {
  'R-134a': { ground: '#882255', ink: WHITE, pattern: 'rising lines', mark: 'M-2 2 2-2M0 8 8 0M6 10 10 6' },
  'R-1234yf': { ground: '#44AA99', ink: BLACK, pattern: 'falling lines', mark: 'M-2 6 2 10M0 0 8 8M6-2 10 2' },
  'R-12': { ground: '#332288', ink: WHITE, pattern: 'upright lines', mark: 'M2 0V8M6 0V8' },
  'R-22': { ground: '#CC6677', ink: BLACK, pattern: 'level lines', mark: 'M0 2H8M0 6H8' },
  'R-152a': { ground: '#999933', ink: BLACK, pattern: 'grid', mark: 'M0 4H8M4 0V8' },
  'R-290': { ground: '#DDCC77', ink: BLACK, pattern: 'dots', mark: 'M1 1h2v2h-2zM5 5h2v2h-2z', filled: true },
  'R-600a': { ground: '#DDCC77', ink: BLACK, pattern: 'rings', mark: 'M4 1.6a2.4 2.4 0 1 1 0 4.8a2.4 2.4 0 1 1 0-4.8' },
  'R-744': { ground: '#117733', ink: WHITE, pattern: 'plus signs', mark: 'M4 1V7M1 4H7' },
  'R-32': { ground: '#88CCEE', ink: BLACK, pattern: 'upright dashes', mark: 'M2 0V4M6 4V8' },
  'R-125': { ground: '#AA4499', ink: WHITE, pattern: 'zigzag', mark: 'M0 6 2 2 4 6 6 2 8 6' },
  'R-143a': { ground: '#117733', ink: WHITE, pattern: 'level dashes', mark: 'M0 2H4M4 6H8' },
  'R-404A': { ground: '#88CCEE', ink: BLACK, pattern: 'crossed lines', mark: 'M0 0 8 8M8 0 0 8' },
  'R-407C': { ground: '#332288', ink: WHITE, pattern: 'bricks', mark: 'M0 0H8M0 4H8M2 0V4M6 4V8' },
  'R-410A': { ground: '#AA4499', ink: WHITE, pattern: 'triangles', mark: 'M1 7 4 1 7 7z', filled: true },
  'HC': { ground: '#DDCC77', ink: BLACK, pattern: 'checks', mark: 'M0 0h4v4H0zM4 4h4v4H4z', filled: true },
  'OTHER': { ground: '#DDDDDD', ink: BLACK, pattern: 'waves', mark: 'M0 4c1.3-3 2.7-3 4 0s2.7 3 4 0' },
}

/** What people call a substance: the groups get words. */
export function substanceName(substance: Substance | 'air'): string {
  if (substance === 'HC') return 'Hydrocarbons'
  if (substance === 'OTHER') return 'Unknown'
  return substance === 'air' ? 'Air' : substance
}
