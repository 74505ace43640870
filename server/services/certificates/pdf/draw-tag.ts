import { VERDICT_GLYPHS } from '#shared/verdict/glyphs'
import type { VerdictKind } from '#shared/verdict/types'
import { INK, LINE, WHITE, type Paper } from './paper'

interface Look { ink: string, solid: boolean, dashed?: true, end: number }

/** As on the screen: plain, perforated end, dashed edge, solid, solid with hatching. */
const LOOKS: Record<VerdictKind, Look> = {
  'connect': { ink: '#03484A', solid: false, end: 8 },
  'connect-purge-air': { ink: '#2A3AC4', solid: false, end: 20 },
  'sample-again': { ink: '#684606', solid: false, dashed: true, end: 8 },
  'isolate': { ink: '#90147F', solid: true, end: 8 },
  'isolate-flammable': { ink: '#360F05', solid: true, end: 28 },
}

export const TAG_HEIGHT = 46

/** Draws the tag of a verdict with its eyelet and wire. */
export function drawTag(paper: Paper, verdict: VerdictKind, words: string, x: number, y: number): void {
  const { doc } = paper
  const look = LOOKS[verdict]
  const height = TAG_HEIGHT
  const head = height / 2
  const wordsWidth = paper.widthOf(words, { face: 'bold', size: 22 })
  const body = head + 8 + 28 + 8 + wordsWidth + 12
  const width = body + look.end
  const outline = `M${x + head} ${y}H${x + width}V${y + height}H${x + head}L${x} ${y + height - 13}V${y + 13}Z`

  doc.save()
  doc.path(outline).fill(look.solid ? look.ink : WHITE)
  if (verdict === 'isolate-flammable') hatch(paper, x + body, y, look.end, height)
  if (verdict === 'connect-purge-air') perforate(paper, x + body, y, look.ink, height)
  doc.lineWidth(1.6)
  if (look.dashed) doc.dash(5, { space: 3.5 })
  doc.path(outline).stroke(look.ink).undash()

  const onTag = look.solid ? WHITE : look.ink
  const eyelet = { x: x + head * 0.72, y: y + height / 2 }
  doc.circle(eyelet.x, eyelet.y, 6).lineWidth(1.6).fillAndStroke(WHITE, look.solid ? WHITE : look.ink)
  doc.path(`M${eyelet.x} ${eyelet.y}C${eyelet.x - 14} ${eyelet.y - 6} ${eyelet.x - 20} ${eyelet.y - 24} ${eyelet.x - 9} ${eyelet.y - 32}M${eyelet.x} ${eyelet.y}C${eyelet.x - 8} ${eyelet.y - 10} ${eyelet.x - 10} ${eyelet.y - 22} ${eyelet.x - 6} ${eyelet.y - 33}`).lineWidth(1).stroke(LINE)
  doc.restore()

  doc.save().translate(x + head + 8, y + height / 2 - 14).scale(28 / 24).lineCap('square').lineJoin('round')
  for (const stroke of VERDICT_GLYPHS[verdict]) {
    doc.path(stroke.path)
    if (stroke.filled) doc.fill(onTag)
    else doc.lineWidth(stroke.width).stroke(onTag)
  }
  doc.restore()
  paper.write(words, { x: x + head + 44, y: y + height / 2 - 14.5, width: wordsWidth + 10, face: 'bold', size: 22, color: onTag })
}

function hatch(paper: Paper, x: number, y: number, width: number, height: number): void {
  const { doc } = paper
  doc.save().rect(x, y, width, height).clip()
  for (let at = -height; at < width + height; at += 9) doc.moveTo(x + at, y + height).lineTo(x + at + height, y)
  doc.lineWidth(3.4).stroke(WHITE).restore()
}

function perforate(paper: Paper, x: number, y: number, ink: string, height: number): void {
  for (let at = 7; at < height; at += 8) paper.doc.circle(x + 8, y + at - 0.5, 2.2)
  paper.doc.fill(ink)
}

/** The mark before an outcome: ring, half, solid with a bar, triangle, dashes. */
export function drawOutcome(paper: Paper, outcome: 'pass' | 'unclear' | 'fail' | 'warn' | 'absent', x: number, y: number): void {
  const { doc } = paper
  doc.save().translate(x, y).scale(8 / 14).lineWidth(1.6)
  if (outcome === 'warn') doc.path('M7 1.8 13 12.5H1Z').stroke(INK)
  else if (outcome === 'fail') {
    doc.circle(7, 7, 6.2).fill(INK)
    doc.path('M4 7h6').lineWidth(2).stroke(WHITE)
  } else {
    if (outcome === 'absent') doc.dash(2, { space: 2 })
    doc.circle(7, 7, 5.5).stroke(INK).undash()
    if (outcome === 'unclear') doc.path('M7 1.5a5.5 5.5 0 0 1 0 11Z').fill(INK)
  }
  doc.restore()
}
