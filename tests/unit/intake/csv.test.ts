import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { csvHeader as H, csvRow as B, csvRowWith, decode, reading } from './samples'

const good = reading((r) => {
  delete r.instrument.sequence
})
const partsOf = (outcome: Awaited<ReturnType<typeof decode>>) => outcome.readings.map(({ composition }) => composition.parts)

describe('encodings', () => {
  it('C01 a byte-order mark is no part of the first name', async () => {
    const { readings, report } = await decode(`\uFEFF${H}\n${B}\n`)
    expect(readings).toEqual([good])
    expect(report).toEqual({ encoding: 'utf-8', delimiter: ',', extraColumns: [] })
  })

  it.each([
    ['UTF-16LE with mark', (text: string) => Buffer.from(`\uFEFF${text}`, 'utf16le'), 'utf-16le'],
    ['UTF-16LE without', (text: string) => Buffer.from(text, 'utf16le'), 'utf-16le'],
    ['UTF-16BE with mark', (text: string) => Buffer.from(`\uFEFF${text}`, 'utf16le').swap16(), 'utf-16be'],
    ['Windows-1252', (text: string) => Buffer.from(text.replace('€', '\u0080'), 'latin1'), 'windows-1252'],
    ['UTF-8', (text: string) => Buffer.from(text), 'utf-8'],
  ])('C02 C03 %s', async (_, encode, encoding) => {
    const bytes = encode(`${H}\r\n${B}21 °C, 5 €\r\n`.replace('21 °C, 5 €', '"21 °C, 5 €"'))
    for (const chunks of [[100_000], [1], [3]]) {
      const { readings, report } = await decode(bytes, { chunks })
      expect(readings[0]?.note).toBe('21 °C, 5 €')
      expect(report?.encoding).toBe(encoding)
    }
  })

  it('a line in another encoding than the lines before is refused alone', async () => {
    const bytes = Buffer.concat([Buffer.from(`${H}\n${B}ü\n${B}`), Buffer.of(0xB0, 0x0A), Buffer.from(B)])
    const { readings, refusals } = await decode(bytes)
    expect(readings.map(({ note }) => note)).toEqual(['ü', undefined])
    expect(refusals).toEqual([expect.objectContaining({ code: 'encoding', line: 3 })])
  })

  it('UTF-16 that breaks off is told', async () => {
    const bytes = Buffer.concat([Buffer.from(`\uFEFF${H}\n${B}`, 'utf16le'), Buffer.of(0x00, 0xD8, 0x41, 0x00)])
    expect((await decode(bytes)).failure).toMatchObject({ code: 'encoding' })
  })
})

describe('delimiters and decimal marks', () => {
  it('C04 semicolon with decimal comma', async () => {
    const { readings, report } = await decode(`${H}\n${B}`.replaceAll(',', ';').replace('99.4', '99,4'))
    expect(readings).toEqual([good])
    expect(report?.delimiter).toBe(';')
  })

  it('C05 a decimal comma that cuts a number in two', async () => {
    const { refusals } = await decode(`${H}\n${B.replace('99.4', '99,4')}`)
    expect(refusals).toEqual([expect.objectContaining({ code: 'column-count', line: 2 })])
    expect(refusals[0]!.mend).toContain('decimal comma')
  })

  it('C06 a decimal comma in quotes', async () => {
    const { refusals } = await decode(`${H}\n${B.replace('99.4', '"99,4"')}`)
    expect(refusals).toEqual([expect.objectContaining({ code: 'number', line: 2, column: 'r134a_pct', value: '99,4' })])
  })

  it('C07 tabs, with either decimal mark', async () => {
    const { readings, report } = await decode(`${H}\n${B}\n${B}`.replaceAll(',', '\t').replace('99.4', '99,4'))
    expect(readings).toEqual([good, good])
    expect(report?.delimiter).toBe('\t')
  })

  it('names may have capitals and spaces around them, and stand in any order', async () => {
    const shuffle = (line: string): string => line.split(',').reverse().join(',')
    const { readings } = await decode(`${shuffle(H).toUpperCase().replaceAll(',', ' , ')}\n${shuffle(B)}`)
    expect(readings).toEqual([good])
  })
})

describe('the header', () => {
  it.each([
    ['C08 a header alone', `${H}\n`],
    ['C08 nothing', ''],
    ['C08 blank lines', '\r\n\n  \r'],
  ])('%s is empty', async (_, text) => {
    expect((await decode(text)).failure).toMatchObject({ code: 'empty' })
  })

  it('C09 no header: what was found and what is expected', async () => {
    const { failure, records } = await decode(`${B}\n${B}`)
    expect(failure).toMatchObject({ code: 'header', place: 'line 1' })
    expect(failure!.reason).toContain('BT-1')
    expect(failure!.mend).toContain('r1234yf_pct')
    expect(records).toEqual([])
  })

  it('a header without one of the columns needed', async () => {
    const { failure } = await decode(`${H.replace('declared', 'declaired')}\n${B}`)
    expect(failure).toMatchObject({ code: 'header' })
    expect(failure!.reason).toContain('Missing: declared.')
  })

  it('C10 a column twice, also in other capitals', async () => {
    expect((await decode(`${H},hc_pct\n${B},1`)).failure).toMatchObject({ code: 'duplicate-column', place: 'line 1, column 14' })
    expect((await decode(`${H},HC_PCT\n${B},1`)).failure).toMatchObject({ code: 'duplicate-column' })
    expect((await decode(`${H},own,own\n${B},1,2`)).failure).toMatchObject({ code: 'duplicate-column' })
  })

  it('C11 C12 unknown columns are kept as extras and reported, whatever they are called', async () => {
    const { outcomes, report } = await decode(`${H},operator_badge,__proto__,constructor,\n${B},007,"{""admin"":true}",x,\n`)
    expect(report?.extraColumns).toEqual(['operator_badge', '__proto__', 'constructor', 'column 17'])
    const [outcome] = outcomes
    if (!('reading' in outcome!)) throw new Error('refused')
    expect(Object.entries(outcome.extras!)).toEqual([['operator_badge', '007'], ['__proto__', '{"admin":true}'], ['constructor', 'x']])
    expect(({} as { admin?: boolean }).admin).toBeUndefined()
  })

  it('too many columns', async () => {
    const more = (count: number): string => Array.from({ length: count }, (_, index) => `,own${index}`).join('')
    expect((await decode(`${H}${more(187)}\n${B}${','.repeat(187)}`)).failure).toBeUndefined()
    expect((await decode(`${H}${more(188)}\n${B}${','.repeat(188)}`)).failure).toMatchObject({ code: 'header' })
  })

  it('far too many columns, at once', async () => {
    const begin = performance.now()
    const { failure } = await decode(`${H},${Array.from({ length: 150_000 }, (_, index) => index.toString(36)).join(',')}\n`)
    expect(failure).toMatchObject({ code: 'header' })
    expect(performance.now() - begin).toBeLessThan(3_000)
  })

  it.each([
    ['C21 a workbook', Buffer.from([0x50, 0x4B, 3, 4, 0x14, 0, 6, 0])],
    ['an older workbook', Buffer.from([0xD0, 0xCF, 0x11, 0xE0, 0xA1, 0xB1])],
  ])('%s is told', async (_, bytes) => {
    const { failure } = await decode(bytes, { chunks: [1] })
    expect(failure).toMatchObject({ code: 'workbook' })
    expect(failure!.mend).toContain('CSV')
  })
})

describe('rows', () => {
  it('C13 too few and too many fields', async () => {
    const { readings, refusals } = await decode(`${H}\n${B}\nt-2,a\n${B},,,\n${B}\n`)
    expect(readings).toHaveLength(2)
    expect(refusals.map(({ code, line }) => [code, line])).toEqual([['column-count', 3], ['column-count', 4]])
    expect(refusals[0]!.reason).toContain('11 too few')
    expect(refusals[1]!.reason).toContain('3 too many')
    expect(refusals[1]!.mend).not.toContain('decimal')
  })

  it('rows of nothing but delimiters are blank', async () => {
    const { records } = await decode(`${H}\n${B}\n${','.repeat(12)}\n , ,\n${B}`)
    expect(records.map(({ ordinal, line }) => [ordinal, line])).toEqual([[1, 2], [2, 5]])
  })

  it('C14 a quote that is never closed costs its own row', async () => {
    const rows = Array.from({ length: 1_000 }, (_, index) => csvRowWith({ id: `t-${index}` }) + (index === 1 ? '"open' : ''))
    const { readings, refusals } = await decode(`${H}\n${rows.join('\n')}\n`)
    expect(refusals).toEqual([expect.objectContaining({ code: 'quote', line: 3 })])
    expect(refusals[0]!.reason).toContain('998 lines')
    expect(readings).toHaveLength(999)
  })

  it('a quote that is never closed, beyond what is kept, costs its own row too', async () => {
    const rows = Array.from({ length: 200 }, (_, index) => csvRowWith({ id: `t-${index}` }) + (index === 1 ? '"open' : ''))
    const { readings, refusals } = await decode(`${H}\n${rows.join('\n')}\n`, { limits: { lineBytes: 2_000 } })
    expect(refusals).toEqual([expect.objectContaining({ code: 'quote', line: 3 })])
    expect(readings).toHaveLength(199)
  })

  it('a quote that is not closed within any number of blank lines', async () => {
    const { readings, refusals } = await decode(`${H}\n${B}"open${'\n'.repeat(10_000)}${B}\n`)
    expect(refusals).toEqual([expect.objectContaining({ code: 'quote', line: 2 })])
    expect(readings).toHaveLength(1)
  })

  it('quotes in the wrong place', async () => {
    const { readings, refusals } = await decode(`${H}\n${B}5" hose\n${B}"a"b\n${B}"open\n${B}"closed"\n${B}`)
    expect(refusals.map(({ code, line }) => [code, line])).toEqual([['quote', 2], ['quote', 3], ['quote', 4]])
    expect(readings.map(({ note }) => note)).toEqual(['closed', undefined])
  })

  it('C15 line breaks and quotes in a note, and the right lines after it', async () => {
    const { readings, refusals, records } = await decode(`${H}\r\n${B}"a ""b"" \n\r\n c"\r\n${B.replace('99.4', 'x')}\r\n`)
    expect(readings.map(({ note }) => note)).toEqual(['a "b" \n\r\n c'])
    expect(refusals).toEqual([expect.objectContaining({ code: 'number', line: 5 })])
    expect(records[0]!.raw).toBe(`${B}"a ""b"" \n\r\n c"`)
  })

  it('C16 mixed ends of line', async () => {
    const { records, readings } = await decode(`${H}\r${B}\n${B}\r\n${B}\r\r\n\n${B}`)
    expect(records.map(({ line }) => line)).toEqual([2, 3, 4, 7])
    expect(readings).toHaveLength(4)
  })

  it('C20 a field that is too long, at the bound and beyond', async () => {
    const note = (length: number): string => `${B}${'x'.repeat(length)}`
    const { refusals } = await decode(`${H}\n${note(1024 * 1024)}\n${note(65_537)}\n${note(65_536)}\n${B}`)
    expect(refusals.map(({ code, line, column }) => [code, line, column])).toEqual([
      ['field-too-long', 2, 'note'], ['field-too-long', 3, 'note'], ['length', 4, 'note'],
    ])
  })

  it('C20 too many rows, at the bound and beyond', async () => {
    const limits = { streamRecords: 10 }
    expect((await decode(`${H}\n${`${B}\n`.repeat(10)}`, { limits })).failure).toBeUndefined()
    expect((await decode(`${H}\n${`${B}\n`.repeat(11)}`, { limits })).failure).toMatchObject({ code: 'too-many-rows', place: 'line 12' })
  })

  it('a NUL in a cell, known or not', async () => {
    const { refusals, records } = await decode(`${H},own\n${B}a\u0000b,\n${B},a\u0000b\n`)
    expect(refusals.map(({ code, line, column }) => [code, line, column])).toEqual([['bad-character', 2, 'note'], ['bad-character', 3, 'own']])
    expect(records.every(({ raw }) => !raw.includes('\u0000'))).toBe(true)
  })
})

describe('numbers', () => {
  it.each([
    ['<0.3', { percent: 0.3, qualifier: '<' }],
    ['< 0.3', { percent: 0.3, qualifier: '<' }],
    [' 0.3 ', { percent: 0.3 }],
    ['0.3%', { percent: 0.3 }],
    ['0.3 %', { percent: 0.3 }],
    ['+.3', { percent: 0.3 }],
    ['3e-1', { percent: 0.3 }],
  ])('C17 C22 hc_pct %j', async (cell, part) => {
    const outcome = await decode(`${H}\n${csvRowWith({ hc_pct: cell, r134a_pct: '99.7' })}`)
    expect(partsOf(outcome)).toEqual([[{ substance: 'R-134a', percent: 99.7 }, { substance: 'HC', ...part }]])
  })

  it('C17 with decimal comma', async () => {
    const outcome = await decode(`${H}\n${csvRowWith({ hc_pct: '<0.3', r134a_pct: '99.7' })}`.replaceAll(',', ';').replaceAll('.', ','))
    expect(partsOf(outcome)[0]![1]).toEqual({ substance: 'HC', percent: 0.3, qualifier: '<' })
  })

  it('C17 empty is not measured', async () => {
    const outcome = await decode(`${H}\n${csvRowWith({ hc_pct: '', air_pct: '', r134a_pct: '100' })}`)
    expect(partsOf(outcome)).toEqual([[{ substance: 'R-134a', percent: 100 }]])
    expect(outcome.readings[0]!.composition.airPercent).toBeUndefined()
  })

  it('air below detection', async () => {
    const { readings } = await decode(`${H}\n${csvRowWith({ air_pct: '<0.3' })}`)
    expect(readings[0]!.composition).toMatchObject({ airPercent: 0.3, airQualifier: '<' })
  })

  it.each(['ND', '-', 'n/a', '"<0,3"', '<', '%', '0x10', '1_000', '--1', '1.2.3', 'NaN', 'Infinity', '<<1'])('C17 %s is no number', async (cell) => {
    const { refusals } = await decode(`${H}\n${csvRowWith({ hc_pct: cell })}`)
    expect(refusals).toEqual([expect.objectContaining({ code: 'number', line: 2, column: 'hc_pct', value: cell.replaceAll('"', '') })])
  })

  it.each([['1e400', 'range'], ['9007199254740993', 'range'], ['101', 'range'], ['-0.1', 'range']])('%s is out of range', async (cell, code) => {
    const { refusals } = await decode(`${H}\n${csvRowWith({ hc_pct: cell })}`)
    expect(refusals).toEqual([expect.objectContaining({ code, line: 2, column: 'hc_pct', value: cell })])
  })

  it('every faulty cell is told, with its column', async () => {
    const { refusals } = await decode(`${H}\n${csvRowWith({ hc_pct: 'x', r134a_pct: 'y', air_pct: 'z' })}`)
    expect(refusals.map(({ column, value }) => [column, value])).toEqual([['r134a_pct', 'y'], ['hc_pct', 'x'], ['air_pct', 'z']])
  })
})

describe('refusals name columns', () => {
  it.each([
    [{ sampled_at: '2026-03-14 09:26' }, 'time', 'sampled_at', '2026-03-14 09:26'],
    [{ declared: 'R134A' }, 'unknown-substance', 'declared', 'R134A'],
    [{ subject_kind: 'car' }, 'choice', 'subject_kind', 'car'],
    [{ instrument_serial: '' }, 'missing', 'instrument_serial', undefined],
    [{ subject_kind: 'cylinder' }, 'unknown-member', 'plate', 'TST 001'],
    [{ resolution: '0' }, 'range', 'resolution', '0'],
    [{ hc_pct: '', r134a_pct: '' }, 'missing', undefined, undefined],
    [{ plate: '' }, 'subject', undefined, '{"kind":"vehicle"}'],
  ])('%j', async (cells, code, column, value) => {
    const { refusals } = await decode(`${H}\n${csvRowWith(cells as Record<string, string>)}`)
    const refusal = refusals.find(refusal => refusal.code === code)
    expect(refusal).toMatchObject({ code, line: 2 })
    expect(refusal!.column).toBe(column)
    expect(refusal!.value).toBe(value)
    expect(refusal!.pointer).toBeUndefined()
  })
})

describe('however the bytes are chunked', () => {
  it('the records are the same', async () => {
    const body = `\uFEFF${H},é\r\n${B}"ü ""\u{1F698}"" \r\n\r x",1\r${B}"open,2\n${B},"3"\r\n\n${B.replace('99.4', 'ß')},4`
    const whole = await decode(body)
    expect(whole.records).toHaveLength(4)
    await fc.assert(fc.asyncProperty(fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 20 }), async (chunks) => {
      const cut = await decode(body, { chunks })
      expect(cut.records).toEqual(whole.records)
      expect(cut.report).toEqual(whole.report)
    }), { numRuns: 100 })
  })

  it('nothing that is sent can do more than be refused', async () => {
    const piece = fc.constantFrom(H, B, ',', ';', '\t', '"', '""', '\r', '\n', '\r\n', 'x', '\u0000', 'é', '<', '99,4', `${H}\n`, `${B}\n`, `"${B}"`)
    await fc.assert(fc.asyncProperty(fc.array(piece, { maxLength: 40 }), fc.boolean(), async (pieces, headed) => {
      const { records, batches, failure } = await decode((headed ? `${H}\n` : '') + pieces.join(''))
      expect(records.map(({ ordinal }) => ordinal)).toEqual(records.map((_, index) => index + 1))
      expect(batches.length > 0 || failure !== undefined).toBe(true)
    }), { numRuns: 500 })
  })
})
