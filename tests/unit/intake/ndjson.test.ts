import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { decode, reading, readingText } from './samples'

const ndjson = { mediaType: 'application/x-ndjson' }
const named = (id: string): string => readingText.replace('"t-1"', JSON.stringify(id))

describe('NDJSON', () => {
  it('N01 counts blank lines, takes CR LF, and needs no end of line at the end', async () => {
    const { records, readings, report } = await decode(`${named('a')}\r\n\r\n \t\n${named('b')}`, ndjson)
    expect(records.map(({ ordinal, line }) => [ordinal, line])).toEqual([[1, 1], [2, 4]])
    expect(readings.map(({ id }) => id)).toEqual(['a', 'b'])
    expect(report).toEqual({ encoding: 'utf-8', delimiter: null, extraColumns: [] })
  })

  it('N02 refuses the line that is no JSON, not its neighbours', async () => {
    const { readings, refusals } = await decode(`${named('a')}\n{bad\n${named('b')}\n`, ndjson)
    expect(readings.map(({ id }) => id)).toEqual(['a', 'b'])
    expect(refusals).toEqual([expect.objectContaining({ code: 'syntax', line: 2, value: '{bad' })])
    expect(refusals[0]!.reason).toContain('character 2')
  })

  it('N03 refuses the line that is too long, and goes on', async () => {
    const { readings, refusals, records } = await decode(`${named('a')}\n"${'x'.repeat(5 * 1024 * 1024)}"\n${named('b')}\n`, ndjson)
    expect(readings.map(({ id }) => id)).toEqual(['a', 'b'])
    expect(refusals).toEqual([expect.objectContaining({ code: 'line-too-long', line: 2 })])
    expect(records[1]!.raw.length).toBeLessThanOrEqual(1024 * 1024)
  })

  it('takes a line at the bound and refuses one byte more', async () => {
    const line = (length: number): string => `"${'x'.repeat(length - 2)}"`
    const { refusals } = await decode(`${line(1_000)}\n${line(1_001)}\n`, { ...ndjson, limits: { lineBytes: 1_000 } })
    expect(refusals.map(({ code }) => code)).toEqual(['type', 'line-too-long'])
  })

  it('refuses the line that is no UTF-8, with what can be kept of it', async () => {
    const bytes = Buffer.concat([Buffer.from(`${named('a')}\n"x`), Buffer.of(0xC3, 0x28), Buffer.from(`"\n${named('b')}`)])
    const { readings, refusals, records } = await decode(bytes, ndjson)
    expect(readings).toHaveLength(2)
    expect(refusals).toEqual([expect.objectContaining({ code: 'encoding', line: 2 })])
    expect(records[1]!.raw).toBe('"x\uFFFD("')
  })

  it('keeps the source text of each line', async () => {
    const spaced = ` ${named('a')} `
    const { records } = await decode(`${spaced}\n`, ndjson)
    expect(records[0]!.raw).toBe(spaced)
  })

  it('takes no list of readings in a line', async () => {
    const { refusals } = await decode(`{"readings":[${readingText}]}\n`, ndjson)
    expect(refusals.map(({ pointer }) => pointer)).toContain('/readings')
  })

  it.each([['nothing', ''], ['blank lines only', '\n\r\n  \n']])('fails on %s', async (_, text) => {
    expect((await decode(text, ndjson)).failure).toMatchObject({ code: 'empty' })
  })

  it('fails on UTF-16', async () => {
    expect((await decode(Buffer.from(`\uFEFF${readingText}`, 'utf16le'), ndjson)).failure).toMatchObject({ code: 'encoding' })
  })

  it('gives the same records however the bytes are chunked', async () => {
    const body = `\uFEFF${named('ä')}\r\n\n{"é\u{1F698}":1}\n${named('b')}\r\n`
    const whole = await decode(body, ndjson)
    expect(whole.readings.map(({ id }) => id)).toEqual(['ä', 'b'])
    await fc.assert(fc.asyncProperty(fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 20 }), async (chunks) => {
      const cut = await decode(body, { ...ndjson, chunks })
      expect(cut.records).toEqual(whole.records)
    }), { numRuns: 100 })
  })

  it('hands out at most 2,000 records at once, in order', async () => {
    const { batches, records } = await decode(Array.from({ length: 5_000 }, (_, index) => named(`t-${index}`)).join('\n'), ndjson)
    expect(Math.max(...batches)).toBeLessThanOrEqual(2_000)
    expect(records.map(({ ordinal }) => ordinal)).toEqual(Array.from({ length: 5_000 }, (_, index) => index + 1))
    expect((records[4_999]!.value as ReturnType<typeof reading>).id).toBe('t-4999')
  })
})
