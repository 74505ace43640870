import { describe, expect, it } from 'vitest'
import type { ReadingDetail } from '#shared/api/readings'
import { certificateStatement, NOT_SHOWN, type CertificateStatement } from '#shared/certificates/statement'
import { drawCertificate } from '#server/services/certificates/pdf/draw-certificate'
import { VERDICTS, type RuleOutcome } from '#shared/verdict/types'
import { TAGS } from '#shared/verdict/words'
import { readCode, readPdf } from '../../support/pdf'

const part = (substance: string, percent: number) => ({ substance, massFraction: percent / 100, massFractionLow: 0, massFractionHigh: percent / 100, moleFraction: percent / 100, belowDetection: false })
const OUTCOMES: RuleOutcome[] = ['pass', 'unclear', 'fail', 'warn', 'absent']

function reading(over: Partial<ReadingDetail> = {}): ReadingDetail {
  return {
    id: '019b0000-0000-7000-8000-000000000001', sampledAt: '2026-03-14T14:26:53.000Z', receivedAt: '2026-03-14T14:30:00.000Z', revision: 3,
    shop: { id: 'x', name: 'Werkstatt Łódź', timeZone: 'Europe/Warsaw' }, instrument: null,
    subject: { kind: 'vehicle', id: 'y', label: 'GDA 11X', vin: null, plate: 'GDA 11X', workOrder: null },
    declared: 'R-134a', verdict: 'isolate', decidedBy: 'purity', decidedBySubstance: null, purityPercent: 90, purityUncertainty: 0.4, contaminants: [], airPercent: null, resolution: 0.1, attempt: 2,
    flags: ['late'], batch: null, source: 'device', reported: { basis: 'mole', air: 'within', resolution: 0.1, parts: [] },
    composition: { rule: 'r', parts: [part('R-134a', 90), part('R-22', 6), part('HC', 4)], air: null, sum: { percent: 100, differencePercent: 0, tolerancePercent: 0.3, outcome: 'agrees' } },
    words: { tag: TAGS.isolate, nextStep: 'Keep the ordinary machine off.', reason: '90.0 ± 0.4 % R-134a, limit 98 %.', plain: '', cautions: ['Never vent.'] },
    rules: OUTCOMES.map(outcome => ({ rule: 'purity', outcome, measured: outcome === 'absent' ? null : 90, uncertainty: 0.4, limit: 98, probabilityBeyond: 1, words: { title: `Rule ${outcome}`, finding: 'Found.', unit: 'percent by mass, air-free', source: 'A source', mark: 'from memory' } })),
    limitSet: { version: 4, name: 'Ours', effectiveFrom: '2026-01-01T12:00:00.000Z', decision: 'Guarded.', guardFactor: 1 },
    marks: { purityMinimum: 98, foreignMaximum: 2, flammableMaximum: 2, unknownMaximum: 2, airCaution: 2, airAction: 3 },
    conditions: { ambientCelsius: -3.2, pressureKilopascal: null, pressureKind: null }, operator: 'Željko Ωmega', note: 'a secret note', digest: 'd'.repeat(64), auditSequence: 77,
    ...over,
  } as ReadingDetail
}

const occasion = { number: 12, code: '2345678923456789', issuedAt: new Date('2026-03-15T00:00:00Z'), issuedBy: { name: 'A. Person', certification: 'C-77' }, organisation: { name: 'Invented Ltd', demo: true }, instrument: { serial: 'S-1', model: '', calibrationDueAt: null } }
const certificate = (statement: CertificateStatement, withdrawn: { at: string, by: string, reason: string } | null = null) => ({
  row: { id: 'z', number: 12, code: statement.code, state: 'genuine' as const, readingRevision: 3, issuedAt: statement.issuedAt, issuedBy: 'A. Person', withdrawn },
  statement, signature: new Uint8Array(64), keyId: '0123456789abcdef',
})
const draw = (over: Partial<ReadingDetail> = {}, format: 'a4' | 'letter' = 'a4') => drawCertificate(certificate(certificateStatement(reading(over), occasion)), { format, verifyAddress: 'https://shop.example/verify/2345678923456789' })

describe('the statement', () => {
  it('holds what is certified and leaves out what stays in the shop', () => {
    const statement = certificateStatement(reading(), occasion)
    expect(statement).toMatchObject({ schema: 'coldslip-certificate/1', number: 12, reading: { revision: 3, digest: 'd'.repeat(64), auditSequence: 77 }, verdict: { kind: 'isolate' }, operator: 'Željko Ωmega', limitSet: { version: 4 } })
    expect(JSON.stringify(statement)).not.toMatch(/secret note|"raw"|"senderReadingId"/)
    expect(statement.notShown).toEqual(NOT_SHOWN)
    expect(certificateStatement(reading(), occasion)).toEqual(statement)
  })
})

// Reading a page back draws it, which takes a second or two on a busy machine.
describe('the drawing', { timeout: 60_000 }, () => {
  it('names every outcome, the missing and the invented, in letters of any of its faces', async () => {
    const { text } = await readPdf(await draw())
    for (const words of ['Inside', 'Too close to call', 'Beyond', 'Noted', 'Not judged', 'Željko', 'Łódź', 'not recorded', 'Due date not on record', 'C-77', 'from memory', '\u22123.2 °C', 'Invented demo data', 'by mole, air within', 'Sample 2 of the visit', 'Arrived long after', 'Public page', 'Not judged']) expect(text.replace(/\s+/g, ' '), words).toContain(words)
    expect(text.replace(/\s/g, '')).toContain('ŽeljkoΩmega')
  })

  it('is one for each verdict, with its code readable on both sizes of paper', async () => {
    const files = new Set<string>()
    for (const verdict of VERDICTS) {
      const pdf = await draw({ verdict, words: { ...reading().words, tag: TAGS[verdict] } }, verdict === 'connect' ? 'letter' : 'a4')
      files.add(Buffer.from(pdf).toString('base64'))
      expect((await readPdf(pdf)).text).toContain(TAGS[verdict])
      if (verdict === 'isolate-flammable' || verdict === 'connect') expect(await readCode(pdf)).toBe('https://shop.example/verify/2345678923456789')
    }
    expect(files.size).toBe(VERDICTS.length)
  })

  it('runs over as many pages as long words need, each with number and place', async () => {
    const long = Array.from({ length: 400 }, (_, index) => `word${index}`).join(' ')
    const pdf = await draw({ words: { ...reading().words, cautions: Array.from({ length: 9 }, () => long) }, operator: 'x'.repeat(2000) })
    const { text, pages } = await readPdf(pdf)
    expect(pages).toBeGreaterThan(2)
    expect(text).toContain(`Page ${pages} of ${pages}`)
    expect(text.replace(/\s/g, '')).toContain('x'.repeat(2000) + 'Issuedby')
    expect(text.match(/word399/g)).toHaveLength(9)
  })

  it('says that it was withdrawn, the day in the shop\'s zone', async () => {
    const withdrawn = { at: '2026-04-01T23:30:00Z', by: 'Q', reason: 'kept inside' }
    const pdf = await drawCertificate(certificate(certificateStatement(reading(), occasion), withdrawn), { format: 'a4', verifyAddress: 'https://shop.example/verify/2345678923456789' })
    const { text } = await readPdf(pdf)
    expect(text).toContain('WITHDRAWN on 2 Apr 2026')
    expect(text).not.toContain('kept inside')
  })

  it('is the same to the last byte for the same certificate', async () => {
    expect((await draw()).equals(await draw())).toBe(true)
  })
})
