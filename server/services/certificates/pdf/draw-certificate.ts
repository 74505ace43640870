import { groupedCode } from '#shared/certificates/code'
import type { CertificateStatement } from '#shared/certificates/statement'
import { figure } from '#shared/composition/figures'
import { stripFromDetail } from '#shared/composition/strip'
import { FLAG_WORDS, SUBJECT_NAMES } from '#shared/intake/flag-words'
import { longDayIn, longStampIn, zoneText } from '#shared/text/times'
import type { StoredCertificate } from '../certificates.queries'
import { drawCode } from './draw-code'
import { drawRules } from './draw-rules'
import { drawStrip } from './draw-strip'
import { drawTag, TAG_HEIGHT } from './draw-tag'
import { loadFonts } from './fonts'
import { INK, LINE, Paper, SOFT, WHITE, type Span } from './paper'

export interface CertificatePaper {
  format: 'a4' | 'letter'
  /** Address of the public page; stands in the code. */
  verifyAddress: string
}

/** Draws a certificate as PDF; the same certificate in the same state always gives the same bytes. */
export async function drawCertificate({ row, statement, signature, keyId }: StoredCertificate, { format, verifyAddress }: CertificatePaper): Promise<Buffer> {
  const { number, shop, organisation } = statement
  const paper = new Paper({ format, fonts: await loadFonts(), title: `Certificate ${number}, ${shop.name}`, author: organisation, date: new Date(statement.issuedAt) })
  drawHead(paper, statement)
  if (row.withdrawn) drawBand(paper, `WITHDRAWN on ${longDayIn(row.withdrawn.at, shop.timeZone)}. This certificate no longer holds.`)
  drawVerdict(paper, statement, verifyAddress)
  drawStrip(paper, stripFromDetail(statement))
  paper.y += 2
  paper.y += paper.write(basisWords(statement), { size: 7.2, color: SOFT })
  drawFacts(paper, factsOf(statement))
  drawList(paper, 'What this does not show', statement.notShown)
  drawProof(paper, statement, { signature: Buffer.from(signature).toString('base64url'), keyId, verifyAddress })
  drawRules(paper, statement)
  drawFeet(paper, statement)
  return paper.finish()
}

const EDGE = 'M0 5.5 5 4 9 6 14 3 20 5 24 2.5 31 4.5 37 3.5 41 6 48 4 53 5.5 60 2.5 66 4 71 3 77 6 83 4.5 88 5.5 95 3 101 5 106 2.5 113 4 118 6 124 3.5 130 5 136 3 142 5 148 5.5'

function drawHead(paper: Paper, { organisation, shop, number, issuedAt, demo }: CertificateStatement): void {
  const { doc, left, width } = paper
  doc.save().rect(left, paper.y, width, 10).clip()
  for (let x = 0; x < width; x += 148) doc.save().translate(left + x, paper.y).path(EDGE).lineWidth(0.9).stroke(INK).restore()
  doc.restore()
  paper.y += 18
  const top = paper.y
  paper.write(organisation, { width: width * 0.6, face: 'bold', size: 11 })
  const height = paper.heightOf(organisation, { width: width * 0.6, face: 'bold', size: 11 })
  paper.write(shop.name, { y: top + height, width: width * 0.6, color: SOFT })
  paper.write([{ text: 'Certificate  ', face: 'bold', size: 11 }, { text: `No. ${number}`, face: 'mono', size: 11 }], { align: 'right' })
  paper.write(`Issued ${longDayIn(issuedAt, shop.timeZone)}`, { y: top + 15, align: 'right', color: SOFT })
  paper.y = top + height + paper.heightOf(shop.name, { width: width * 0.6 }) + 6
  if (demo) {
    const words = 'Invented demo data: no workshop, vehicle, person or reading in this document is real.'
    doc.rect(left, paper.y, width, 17).lineWidth(0.8).dash(4, { space: 2.5 }).stroke(INK).undash()
    paper.write(words, { y: paper.y + 3, align: 'center', face: 'bold', size: 8.5 })
    paper.y += 23
  }
}

function drawBand(paper: Paper, words: string): void {
  paper.doc.rect(paper.left, paper.y, paper.width, 20).fill(INK)
  paper.write(words, { y: paper.y + 4, align: 'center', face: 'bold', size: 10, color: WHITE })
  paper.y += 26
}

const CODE_SIDE = 92

function drawVerdict(paper: Paper, { verdict, code }: CertificateStatement, verifyAddress: string): void {
  const { left, width } = paper
  paper.rule()
  paper.y += 6
  const top = paper.y
  const side = { x: left + width - CODE_SIDE, width: CODE_SIDE }
  drawCode(paper, verifyAddress, { x: side.x, y: top, side: CODE_SIDE })
  paper.write(groupedCode(code), { ...side, y: top + CODE_SIDE - 4, align: 'center', face: 'mono', size: 7.2 })
  paper.write('Scan to check', { ...side, y: top + CODE_SIDE + 6, align: 'center', size: 7.2, color: SOFT })

  drawTag(paper, verdict.kind, verdict.tag, left + 14, top + 18)
  const words = width - CODE_SIDE - 18
  let y = top + 18 + TAG_HEIGHT + 10
  y += paper.write(verdict.nextStep, { y, width: words, face: 'bold', size: 12.5 }) + 2
  y += paper.write(verdict.reason, { y, width: words, size: 9.5 }) + 6
  paper.y = Math.max(y, top + CODE_SIDE + 20)
  drawList(paper, 'Cautions', verdict.cautions)
  paper.rule()
  paper.y += 8
}

function heading(paper: Paper, words: string): void {
  paper.y += paper.write(words, { face: 'bold', size: 9.5 }) + 1
}

function drawList(paper: Paper, title: string, items: readonly string[]): void {
  const width = paper.width - 10
  paper.ensure(14 + items.reduce((sum, item) => sum + paper.heightOf(item, { width, size: 8.2 }), 0))
  heading(paper, title)
  for (const item of items) {
    paper.ensure(paper.heightOf(item, { width, size: 8.2 }))
    paper.write('–', { size: 8.2 })
    paper.y += paper.write(item, { x: paper.left + 10, width, size: 8.2 })
  }
  paper.y += 7
}

function basisWords({ reported, attempt }: CertificateStatement): string {
  const samples = attempt > 1 ? ` Sample ${attempt} of the visit.` : ''
  return `Reported by ${reported.basis}, air ${reported.air === 'apart' ? 'apart from' : 'within'} the 100 %, in steps of ${reported.resolution} %; shown by mass, air-free. Bar measured, whisker U (k = 2), tick limit, hatching too close to call.${samples}`
}

const NOT_RECORDED = 'not recorded'

type Fact = [name: string, value: string]

function factsOf(statement: CertificateStatement): Fact[] {
  const { subject, reading, shop, instrument, conditions, operator, issuedBy, flags, declared } = statement
  const zone = shop.timeZone
  const calibration = statement.rules.find(rule => rule.rule === 'calibration')
  const facts: (Fact | null)[] = [
    subject.plate === null ? null : ['Plate', subject.plate],
    subject.vin === null ? null : ['VIN', subject.vin],
    subject.plate === null && subject.vin === null ? [SUBJECT_NAMES[subject.kind], subject.label] : null,
    ['Sampled', `${longStampIn(reading.sampledAt, zone)} ${zoneText(zone)}`],
    ['Work order', subject.workOrder ?? NOT_RECORDED],
    ['Declared', declared],
    ['Instrument', instrument ? [instrument.serial, instrument.model].filter(Boolean).join(', ') : 'not known here'],
    ['Calibration', [calibration?.outcome === 'warn' ? 'Overdue when sampled.' : calibration?.outcome === 'pass' ? 'In date when sampled.' : '', instrument?.calibrationDueAt ? `Due ${longDayIn(instrument.calibrationDueAt, zone)}, as on record at issue.` : 'Due date not on record.'].filter(Boolean).join(' ')],
    ['Technician', operator ?? NOT_RECORDED],
    ['Issued by', [issuedBy.name, issuedBy.certification].filter(Boolean).join(', ')],
    ['Ambient', conditions.ambientCelsius === null ? NOT_RECORDED : `${figure(conditions.ambientCelsius, 0.1)} °C`],
    ['Pressure', conditions.pressureKilopascal === null ? NOT_RECORDED : `${figure(conditions.pressureKilopascal, 1)} kPa ${conditions.pressureKind ?? ''}`],
    flags.length === 0 ? null : ['Noted', flags.map(flag => FLAG_WORDS[flag]).join('; ')],
  ]
  return facts.filter(fact => fact !== null)
}

const MONO_FACTS = new Set(['VIN', 'Plate', 'Work order'])

function drawFacts(paper: Paper, facts: Fact[]): void {
  paper.y += 6
  paper.rule(LINE)
  paper.y += 6
  const column = (paper.width - 16) / 2
  const name = 58
  for (let index = 0; index < facts.length; index += 2) {
    const pair = facts.slice(index, index + 2)
    const style = (fact: Fact) => ({ face: MONO_FACTS.has(fact[0]) && fact[1] !== NOT_RECORDED ? 'mono' as const : 'sans' as const, size: 8.5, width: column - name })
    const height = Math.max(...pair.map(fact => paper.heightOf(fact[1], style(fact))))
    paper.ensure(height)
    for (const [side, fact] of pair.entries()) {
      const x = paper.left + side * (column + 16)
      paper.write(fact[0], { x, width: name, size: 8.5, color: SOFT })
      paper.write(fact[1], { x: x + name, ...style(fact) })
    }
    paper.y += height + 1.5
  }
  paper.y += 5
}

interface Proof { signature: string, keyId: string, verifyAddress: string }

function drawProof(paper: Paper, { reading, limitSet }: CertificateStatement, { signature, keyId, verifyAddress }: Proof): void {
  const mono = (text: string): Span => ({ text, face: 'mono', size: 7.5 })
  const keys = `${new URL(verifyAddress).origin}/.well-known/coldslip-keys.json`
  const lines: Span[][] = [
    [{ text: 'Digest of the record, SHA-256  ' }, mono(reading.digest)],
    [{ text: 'Place in the audit chain  ' }, mono(String(reading.auditSequence)), { text: '   Reading  ' }, mono(`${reading.id}, revision ${reading.revision}`)],
    [{ text: `Signature, Ed25519, key ${keyId}  ` }, mono(signature)],
    [{ text: 'Public page  ' }, mono(verifyAddress)],
    [{ text: 'To check without our server: take certificate.json of this reading and the public keys at  ' }, mono(keys), { text: ' ; the signature covers the canonical JSON (RFC 8785) of "statement".' }],
  ]
  const style = { size: 8, color: INK }
  paper.ensure(16 + lines.reduce((sum, line) => sum + paper.heightOf(line, style) + 1.5, 0))
  heading(paper, `The record, judged by limits version ${limitSet.version}`)
  for (const line of lines) paper.y += paper.write(line, style) + 1.5
  paper.y += 7
}

function drawFeet(paper: Paper, { number, code, shop, demo }: CertificateStatement): void {
  const { doc } = paper
  const { start, count } = doc.bufferedPageRange()
  for (let page = start; page < start + count; page++) {
    doc.switchToPage(page)
    paper.y = doc.page.height - 52
    paper.rule()
    paper.y += 4
    const style = { size: 7.5, color: SOFT }
    paper.write(`Certificate No. ${number}, ${shop.name}${demo ? '. Invented demo data.' : ''}`, { ...style, width: paper.width * 0.6 })
    paper.write([{ text: groupedCode(code), face: 'mono', size: 7.2 }, { text: `   Page ${page - start + 1} of ${count}` }], { ...style, align: 'right' })
  }
}
