import type { CertificateStatement } from '#shared/certificates/statement'
import { formatUncertainty } from '#shared/composition/format'
import { figure, limitFigure } from '#shared/composition/figures'
import { longDayIn } from '#shared/text/times'
import { MARK_WORDS, OUTCOME_WORDS } from '#shared/verdict/outcome-words'
import type { RuleName } from '#shared/verdict/types'
import { drawOutcome } from './draw-tag'
import { INK, LINE, SOFT, type Paper, type Span } from './paper'

type Rule = CertificateStatement['rules'][number]

/** Which side of the limit is kept, in words: the faces have no signs for it. */
const SIDES: Partial<Record<RuleName, string>> = { 'purity': 'at least', 'foreign': 'at most', 'flammable': 'below', 'unknown': 'below', 'air-caution': 'below', 'air-action': 'below' }

const isPercent = (rule: Rule) => rule.words.unit.startsWith('percent')

function amount(rule: Rule, value: number, resolution: number): string {
  if (rule.words.unit === 'degrees Celsius') return `${figure(value, 0.1)} °C`
  return rule.words.unit === 'samples' ? figure(value, 1) : figure(value, resolution)
}

function measuredText(rule: Rule, resolution: number): string {
  if (rule.measured === null) return ''
  const spread = rule.uncertainty === null ? '' : ` ± ${formatUncertainty(rule.uncertainty, resolution)}`
  return `${rule.belowDetection ? '< ' : ''}${amount(rule, rule.measured, resolution)}${spread}`
}

function limitText(rule: Rule, resolution: number): string {
  if (rule.limit === null) return ''
  return isPercent(rule) ? `${SIDES[rule.rule] ?? ''} ${limitFigure(rule.limit, resolution)}`.trim() : amount(rule, rule.limit, resolution)
}

/** Every rule that looked at the reading, with its numbers, its limit and where that comes from. */
export function drawRules(paper: Paper, statement: CertificateStatement): void {
  const { limitSet, resolution, shop } = statement
  const { left, width, doc } = paper
  const columns = { outcome: left + width - 236, measured: left + width - 150, limit: left + width - 72 }
  const style = { width: columns.outcome - left - 14, size: 7.3, color: SOFT }
  const rows = statement.rules.map((rule) => {
    const decided = rule.rule === statement.decidedBy && (rule.substance ?? null) === (statement.decidedBySubstance ?? null)
    const words = wordsOf(rule, decided)
    return { rule, decided, words, height: paper.heightOf(words, style) }
  })
  // On one page where it fits on one: a table torn after its first row is no table.
  paper.ensure(Math.min(paper.pageHeight, 50 + rows.reduce((sum, { height }) => sum + height + 4.5, 0)))
  paper.y += paper.write('Rule by rule, with the limits used', { face: 'bold', size: 9.5 }) + 1
  paper.y += paper.write(`Limits "${limitSet.name}", version ${limitSet.version}, in force since ${longDayIn(limitSet.effectiveFrom, shop.timeZone)}. ${limitSet.decision} ± is U, k = 2.`, { size: 7.5, color: SOFT }) + 3
  const head = { size: 7.5, color: SOFT }
  paper.write('Rule', head)
  paper.write('Outcome', { x: columns.outcome, ...head })
  paper.write('Measured, %', { x: columns.measured, width: 70, align: 'right', ...head })
  paper.write('Limit, %', { x: columns.limit, width: 72, align: 'right', ...head })
  paper.y += 11
  paper.rule(INK, 0.8)
  paper.y += 2.5
  for (const { rule, decided, words, height } of rows) {
    paper.ensure(height + 5)
    if (decided) doc.rect(left - 8, paper.y, 2.5, height).fill(INK)
    paper.write(words, style)
    drawOutcome(paper, rule.outcome, columns.outcome, paper.y + 1.5)
    paper.write(OUTCOME_WORDS[rule.outcome], { x: columns.outcome + 12, width: 78, size: 8, face: rule.outcome === 'fail' || rule.outcome === 'unclear' ? 'bold' : 'sans' })
    paper.write(measuredText(rule, resolution), { x: columns.measured - 4, width: 74, align: 'right', face: 'mono', size: 8 })
    paper.write(limitText(rule, resolution), { x: columns.limit, width: 72, align: 'right', face: 'mono', size: 8 })
    paper.y += height + 2
    paper.rule(LINE, 0.3)
    paper.y += 2.5
  }
  paper.y += 7
}

function wordsOf(rule: Rule, decided: boolean): Span[] {
  const { title, finding, source, mark, unit } = rule.words
  const doubt = MARK_WORDS[mark]
  const basis = rule.limit !== null && isPercent(rule) ? `${unit.charAt(0).toUpperCase()}${unit.slice(1)}. ` : ''
  return [
    { text: `${title}${decided ? ' (decided)' : ''}. `, face: 'bold', size: 8.3, color: INK },
    { text: `${finding} `, size: 8, color: INK },
    { text: `${basis}${source}${doubt && !source.includes(doubt) ? `, ${doubt}` : ''}` },
  ]
}
