import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { canonicalReading } from '#shared/intake/canonical-reading'
import { readingsToCsv } from '#shared/intake/csv-write'
import { guardText, unguardText } from '#shared/intake/csv-columns'
import { validateRecord } from '#shared/intake/validate-record'
import { anyReading } from './arbitraries'
import { csvHeader, csvRow, decode, reading } from './samples'

/** Cells of a text in our own dialect, read without our own reader. */
function cellsOf(csv: string): string[][] {
  return csv.trimEnd().split('\r\n').map(line => line.split(','))
}

describe('readings written as CSV', () => {
  it('come back exactly, whatever the texts', async () => {
    const rows = fc.array(fc.record({ reading: anyReading, extra: fc.constantFrom('', ' ', '=1+1', '007', '\'-x', 'a "b"\r\n;') }), { minLength: 1, maxLength: 8 })
    await fc.assert(fc.asyncProperty(rows, async (rows) => {
      const csv = [...readingsToCsv(rows.map(({ reading, extra }) => ({ reading, extras: { own: extra } })), ['own'])].join('')
      const { readings, refusals, outcomes } = await decode(csv)
      expect(refusals).toEqual([])
      expect(readings.map(canonicalReading)).toEqual(rows.map(({ reading }) => canonicalReading(reading)))
      for (const [index, { reading }] of rows.entries()) {
        expect(readings[index]).toEqual({ ...reading, composition: { ...reading.composition, parts: expect.arrayContaining(reading.composition.parts) } })
        const outcome = outcomes[index]!
        expect('extras' in outcome ? outcome.extras?.own ?? '' : undefined).toBe(rows[index]!.extra)
      }
    }), { numRuns: 300 })
  })

  it('hold no cell that a spreadsheet would run', () => {
    const csv = [...readingsToCsv(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '\r=1'].map(note => ({ reading: reading(r => r.note = note) })))].join('')
    expect(csv).toContain(',\'=1+1,')
    expect(csv).toContain('"\'\r=1"')
    expect(csv).not.toMatch(/(^|[,\n])"?[=+@\t\r]/)
  })

  it('leave negative numbers numbers', () => {
    const [header, row] = cellsOf([...readingsToCsv([{ reading: reading((r) => {
      r.conditions = { ambientCelsius: -5.5 }
    }) }])].join(''))
    expect(row![header!.indexOf('ambient_c')]).toBe('-5.5')
    expect(row![header!.indexOf('text_guard')]).toBe('')
  })

  it('keep notes of other files as they are, apostrophe or not', async () => {
    const notes = ['=1+1', '-', '\'=1+1', '\'\'x']
    const { readings } = await decode(`${csvHeader}\n${notes.map(note => csvRow + note).join('\n')}`)
    expect(readings.map(({ note }) => note)).toEqual(notes)
  })

  it('say below detection with <', async () => {
    const below = reading((r) => {
      r.composition.parts = [{ substance: 'R-134a', percent: 100 }, { substance: 'HC', percent: 0.3, qualifier: '<' }]
      r.composition.airQualifier = '<'
    })
    const { readings } = await decode([...readingsToCsv([{ reading: below }])].join(''))
    expect(readings).toEqual([below])
  })
})

describe('the guard of texts', () => {
  it('is undone exactly', () => {
    fc.assert(fc.property(fc.string({ unit: fc.constantFrom(...'\'=+-@\t\rax') }), (text) => {
      expect(unguardText(guardText(text))).toBe(text)
      expect(guardText(text)).not.toMatch(/^[=+\-@\t\r]/)
    }))
  })
})

describe('random readings', () => {
  it('are taken, so that the tests above mean something', () => {
    fc.assert(fc.property(anyReading, (reading) => {
      expect(validateRecord(reading)).toEqual({ ok: true, reading })
    }), { numRuns: 1_000 })
  })
})
