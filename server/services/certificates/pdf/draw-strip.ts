import { formatUncertainty } from '#shared/composition/format'
import { figure, limitFigure } from '#shared/composition/figures'
import { lensEnd, lensTicks, type Lane, type Strip } from '#shared/composition/strip'
import { SUBSTANCE_LOOKS, substanceName } from '#shared/composition/substance-look'
import type { Substance } from '#shared/refrigerants/designations'
import { INK, LINE, SOFT, WHITE, type Paper } from './paper'

const GROUND = '#E8EEF0'
const STRIP_HEIGHT = 18
const LEADERS = 22
const BAR = 9

/** The composition as on the screen: the strip is the whole, the lens below only what is not the declared refrigerant. */
export function drawStrip(paper: Paper, strip: Strip): void {
  const { doc, left, width } = paper
  const share = (percent: number) => left + Math.min(100, Math.max(0, percent)) / 100 * width
  paper.ensure(60)
  const spread = strip.purityUncertainty === null ? '' : ` ± ${formatUncertainty(strip.purityUncertainty, strip.resolution)}`
  paper.write([{ text: strip.declared, face: 'bold', size: 11 }, { text: '  declared', color: SOFT }])
  paper.write([{ text: figure(strip.purityPercent, strip.resolution), face: 'mono', size: 12 }, { text: `${spread} %`, face: 'mono', color: SOFT }], { align: 'right' })
  paper.y += 18

  const top = paper.y
  doc.save().rect(left, top, width, STRIP_HEIGHT).fill(GROUND)
  doc.rect(left, top, share(strip.purityPercent) - left, STRIP_HEIGHT).fill(INK)
  let from = strip.purityPercent
  for (const lane of strip.lanes.filter(lane => lane.substance !== 'air' && !lane.belowDetection)) {
    fillPattern(paper, lane.substance, share(from), top, share(from + lane.percent) - share(from), STRIP_HEIGHT)
    from += lane.percent
  }
  doc.rect(left, top, width, STRIP_HEIGHT).lineWidth(0.8).stroke(INK).restore()
  paper.y += STRIP_HEIGHT

  const end = lensEnd(strip.lanes)
  if (strip.purityMinimum !== null) {
    const x = share(strip.purityMinimum)
    doc.moveTo(x, paper.y).lineTo(x, paper.y + 8).lineWidth(1.4).stroke(INK)
    paper.write(`at least ${limitFigure(strip.purityMinimum, strip.resolution)}`, { x: x - 124, y: paper.y + 2, width: 120, align: 'right', face: 'mono', size: 7, color: SOFT })
  }
  if (strip.lanes.length === 0) {
    paper.y += LEADERS
    paper.y += paper.write('Nothing else found above the detection limits.', { color: SOFT, size: 8.5 })
    return
  }
  doc.moveTo(share(100 - end), paper.y).lineTo(left, paper.y + LEADERS).moveTo(left + width, paper.y).lineTo(left + width, paper.y + LEADERS).lineWidth(0.6).stroke(LINE)
  paper.y += LEADERS
  drawLens(paper, strip, end)
}

function drawLens(paper: Paper, strip: Strip, end: number): void {
  const { doc, left, width } = paper
  const place = (percent: number) => left + 8 + Math.min(1, Math.max(0, percent / end)) * (width - 16)
  for (const lane of strip.lanes) {
    paper.ensure(50)
    const top = paper.y
    const height = drawLane(paper, lane, strip, end, place)
    doc.moveTo(left, top).lineTo(left, top + height).moveTo(left + width, top).lineTo(left + width, top + height).lineWidth(0.6).stroke(LINE)
    paper.y = top + height
  }
  const axis = paper.y
  doc.moveTo(left, axis).lineTo(left + width, axis).lineWidth(0.6).stroke(LINE)
  const ticks = lensTicks(end)
  for (const [index, tick] of ticks.entries()) {
    doc.moveTo(place(tick), axis).lineTo(place(tick), axis + 3).stroke(LINE)
    const last = index === ticks.length - 1
    paper.write(`${tick}${last ? ' %' : ''}`, { x: place(tick) - (index === 0 ? 0 : last ? 40 : 20), y: axis + 3, width: 40, align: index === 0 ? 'left' : last ? 'right' : 'center', face: 'mono', size: 7, color: SOFT })
  }
  paper.y = axis + 14
}

/** @returns the lane's height. */
function drawLane(paper: Paper, lane: Lane, strip: Strip, end: number, place: (percent: number) => number): number {
  const { doc, left, width, y } = paper
  const value = lane.belowDetection
    ? `< ${figure(lane.percent, strip.resolution)} %`
    : `${figure(lane.percent, strip.resolution)}${lane.uncertainty === null ? '' : ` ± ${formatUncertainty(lane.uncertainty, strip.resolution)}`} %`
  paper.write([{ text: substanceName(lane.substance), face: 'bold', size: 8.5 }, { text: lane.substance === 'air' ? `  ${lane.basis.replace('percent', '%')}` : '', color: SOFT, size: 7.5 }], { x: left + 8, y: y + 3, width: width - 16 })
  paper.write(value, { x: left + 8, y: y + 3, width: width - 16, align: 'right', face: 'mono', size: 8.5 })
  const top = y + 16
  doc.save()
  for (const tick of lensTicks(end)) doc.moveTo(place(tick), top - 1).lineTo(place(tick), top + BAR + 3)
  doc.lineWidth(0.3).stroke(LINE)
  for (const { guard } of lane.limits) if (guard) hatchGuard(paper, place(guard.from), top - 1, place(guard.to) - place(guard.from), BAR + 4)
  const reach = place(lane.percent) - place(0)
  if (lane.belowDetection) doc.rect(place(0), top + 1, reach, BAR - 1).lineWidth(0.7).dash(2.5, { space: 1.5 }).stroke(SOFT).undash()
  else {
    fillPattern(paper, lane.substance, place(0), top, reach, BAR + 1)
    doc.rect(place(0), top, reach, BAR + 1).lineWidth(0.7).stroke(INK)
    if (lane.uncertainty !== null) whisker(paper, place(lane.percent - lane.uncertainty), place(lane.percent + lane.uncertainty), top + (BAR + 1) / 2)
  }
  let depth = 0
  for (const [index, limit] of lane.limits.entries()) {
    const next = lane.limits[index + 1]
    const line = next && (next.at - limit.at) / end < 0.4 ? 1 : 0
    depth = Math.max(depth, line + 1)
    const foot = top + BAR + 9 + line * 8
    doc.moveTo(place(limit.at), top - 2).lineTo(place(limit.at), foot).lineWidth(1.5).stroke(INK)
    const right = limit.at / end > 0.7
    paper.write(`${limit.words} ${limitFigure(limit.at, strip.resolution)}`, { x: right ? place(limit.at) - 124 : place(limit.at) + 4, y: foot - 6.5, width: 120, align: right ? 'right' : 'left', face: 'mono', size: 7, color: SOFT })
  }
  doc.restore()
  return 16 + BAR + 5 + depth * 8
}

function whisker(paper: Paper, from: number, to: number, y: number): void {
  const { doc } = paper
  for (const [weight, color] of [[3.4, WHITE], [1.1, INK]] as const) {
    doc.moveTo(from, y).lineTo(to, y).moveTo(from, y - 2.6).lineTo(from, y + 2.6).moveTo(to, y - 2.6).lineTo(to, y + 2.6).lineWidth(weight).stroke(color)
  }
}

function hatchGuard(paper: Paper, x: number, y: number, width: number, height: number): void {
  const { doc } = paper
  doc.save().rect(x, y, width, height).clip()
  for (let at = -height; at < width; at += 3.2) doc.moveTo(x + at, y + height).lineTo(x + at + height, y)
  doc.lineWidth(0.6).stroke(SOFT).restore()
}

const TILE = 6

/** Fills with the substance's tile, drawn as lines: every printer shows those, not every one a tiling. */
function fillPattern(paper: Paper, substance: Substance | 'air', x: number, y: number, width: number, height: number): void {
  const { doc } = paper
  if (width <= 0) return
  doc.save().rect(x, y, width, height).clip()
  const look = substance === 'air' ? null : SUBSTANCE_LOOKS[substance]
  doc.rect(x, y, width, height).fill(look?.ground ?? WHITE)
  for (let across = x; across < x + width; across += TILE) {
    for (let down = y; down < y + height; down += TILE) {
      doc.save().translate(across, down).scale(TILE / 8)
      if (!look) doc.circle(2, 2, 1).circle(6, 6, 1).fill(INK)
      else if (look.filled) doc.path(look.mark).fill(look.ink)
      else doc.path(look.mark).lineWidth(1.3).stroke(look.ink)
      doc.restore()
    }
  }
  doc.restore()
}
