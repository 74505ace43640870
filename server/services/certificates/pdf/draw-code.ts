import { create } from 'qrcode'
import { INK, WHITE, type Paper } from './paper'

/** Lines around a code that stay white (ISO/IEC 18004). */
const QUIET = 4

/** Draws a QR code of `side` points, quiet zone included. */
export function drawCode(paper: Paper, text: string, { x, y, side }: { x: number, y: number, side: number }): void {
  const { modules } = create(text, { errorCorrectionLevel: 'M' })
  const step = side / (modules.size + 2 * QUIET)
  const { doc } = paper
  doc.save().rect(x, y, side, side).fill(WHITE)
  for (let row = 0; row < modules.size; row++) {
    for (let column = 0; column < modules.size; column++) {
      if (!modules.get(row, column)) continue
      let end = column + 1
      while (end < modules.size && modules.get(row, end)) end++
      // A hair taller than its row, so that no printer leaves a white line between two.
      doc.rect(x + (column + QUIET) * step, y + (row + QUIET) * step, (end - column) * step, step * 1.02)
      column = end
    }
  }
  doc.fill(INK).restore()
}
