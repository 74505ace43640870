import type { VerdictKind } from './types'

/** One line of a glyph in a square of 24 units, open unless `filled`. */
export interface GlyphStroke { path: string, width: number, filled?: true }

const disc = (x: number, y: number, radius: number) => `M${x - radius} ${y}a${radius} ${radius} 0 1 0 ${2 * radius} 0a${radius} ${radius} 0 1 0 ${-2 * radius} 0Z`

/**
 * The five glyphs, drawn as pipe work: flanges met, flanges met with bubbles leaving, a sample going
 * round, a blind plate between flanges, a flame.
 */
export const VERDICT_GLYPHS: Record<VerdictKind, readonly GlyphStroke[]> = {
  'connect': [{ path: 'M2 12h7M15 12h7M9.5 6v12M14.5 6v12M9.5 12h5', width: 2.2 }],
  'connect-purge-air': [
    { path: 'M2 15h7M15 15h7M9.5 10v10M14.5 10v10M9.5 15h5', width: 2.2 },
    { path: disc(12, 5.5, 1.6), width: 1.6 },
    { path: disc(18, 7.5, 1.9), width: 1.6 },
    { path: disc(17, 2.5, 1.1), width: 1.4 },
  ],
  'sample-again': [
    { path: 'M19.2 14.5A7.6 7.6 0 1 1 17.6 6.8', width: 2.2 },
    { path: 'M18.8 2.5V8h-5.5', width: 2.2 },
    { path: disc(12, 12.3, 2.1), width: 0, filled: true },
  ],
  'isolate': [{ path: 'M1.5 12h3.5M19 12h3.5M5.5 7v10M18.5 7v10M12 2.5v19', width: 2.4 }],
  'isolate-flammable': [{ path: 'M12.2 2c.4 4 5.6 6.3 5.6 12.2a5.8 5.8 0 0 1-11.6.3c0-2.7 1.2-4.5 2.6-6 .2 1.9 .9 2.9 2 3.2C12.2 8.5 10.9 5.2 12.2 2Z', width: 2.2 }],
}
