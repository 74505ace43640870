import { gzipSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { canonicalReading } from '#shared/intake/canonical-reading'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import { decodeSubmission } from '#server/services/ingest/decode'
import { csvHeader, csvRow, decode, reading, readingText } from './samples'

const json = { mediaType: 'application/json' }
const ndjson = { mediaType: 'application/x-ndjson' }

describe('media types', () => {
  it.each([
    ['application/json', readingText],
    ['Application/JSON; charset=utf-8', readingText],
    ['application/x-ndjson', `${readingText}\n`],
    ['application/ndjson', `${readingText}\n`],
    ['application/jsonl', `${readingText}\n`],
    ['text/csv;header=present', `${csvHeader}\n${csvRow}`],
    ['text/tab-separated-values', `${csvHeader}\n${csvRow}`.replaceAll(',', '\t')],
  ])('%s is read', async (mediaType, body) => {
    expect((await decode(body, { mediaType })).readings).toHaveLength(1)
  })

  it.each(['text/plain', 'application/xml', '', 'constructor'])('%j is not', async (mediaType) => {
    expect((await decode(readingText, { mediaType })).failure).toMatchObject({ code: 'media-type' })
  })
})

describe('gzip', () => {
  it.each([json, ndjson])('is inflated for $mediaType', async (wish) => {
    const { readings } = await decode(gzipSync(readingText), { ...wish, contentEncoding: 'gzip', chunks: [1, 7] })
    expect(readings).toEqual([reading()])
  })

  it('is inflated for CSV', async () => {
    const { readings } = await decode(gzipSync(`${csvHeader}\n${csvRow}\n`), { contentEncoding: 'GZIP' })
    expect(readings).toHaveLength(1)
  })

  it.each([
    ['N07 plain bytes', Buffer.from(readingText)],
    ['cut off', gzipSync(readingText).subarray(0, 40)],
    ['damaged', gzipSync(readingText).fill(0xFF, 30, 60)],
    ['nothing', Buffer.alloc(0)],
  ])('%s fails', async (_, bytes) => {
    expect((await decode(bytes, { ...ndjson, contentEncoding: 'gzip' })).failure).toMatchObject({ code: 'gzip' })
  })

  it('N08 other encodings are not understood', async () => {
    expect((await decode(readingText, { ...json, contentEncoding: 'br' })).failure).toMatchObject({ code: 'content-encoding' })
  })

  it('N06 stops at the bound when a body inflates beyond it', async () => {
    const bomb = gzipSync(Buffer.alloc(8 * 1024 * 1024, ' '))
    const { failure } = await decode(bomb, { ...ndjson, contentEncoding: 'gzip', limits: { inflatedBytes: 1024 * 1024 } })
    expect(failure).toMatchObject({ code: 'inflated-too-large' })
  })
})

describe('bounds of the body', () => {
  it.each([
    ['JSON', json, 'jsonBodyBytes'],
    ['NDJSON', ndjson, 'streamBodyBytes'],
  ] as const)('%s at its bound and one byte beyond', async (_, wish, bound) => {
    const limits = { [bound]: readingText.length }
    expect((await decode(readingText, { ...wish, limits })).readings).toHaveLength(1)
    expect((await decode(`${readingText} `, { ...wish, limits })).failure).toMatchObject({ code: 'too-large' })
  })

  it('an inflated JSON body has the bound of JSON', async () => {
    const limits = { jsonBodyBytes: readingText.length }
    expect((await decode(gzipSync(readingText), { ...json, contentEncoding: 'gzip', limits })).readings).toHaveLength(1)
    expect((await decode(gzipSync(`${readingText} `), { ...json, contentEncoding: 'gzip', limits })).failure).toMatchObject({ code: 'inflated-too-large' })
  })
})

describe('a stream', () => {
  it('that breaks is no fault of its content', async () => {
    const broken = decodeSubmission({ ...ndjson, contentEncoding: null, chunks: (async function* () {
      yield new TextEncoder().encode(readingText)
      throw new Error('the connection is gone')
    })() }, INTAKE_LIMITS)
    await expect((async () => {
      for await (const _ of broken);
    })()).rejects.toThrow('the connection is gone')
  })

  it('that breaks while it is inflated is no fault of its content either', async () => {
    const broken = decodeSubmission({ ...ndjson, contentEncoding: 'gzip', chunks: (async function* () {
      yield gzipSync(readingText).subarray(0, 20)
      throw new Error('the connection is gone')
    })() }, INTAKE_LIMITS)
    await expect((async () => {
      for await (const _ of broken);
    })()).rejects.toThrow('the connection is gone')
  })

  it('is let go of when nobody reads on', async () => {
    let letGo = false
    const events = decodeSubmission({ ...ndjson, contentEncoding: null, chunks: (async function* () {
      try {
        for (;;) yield new TextEncoder().encode(`${readingText}\n`.repeat(3_000))
      } finally {
        letGo = true
      }
    })() }, INTAKE_LIMITS)
    for await (const event of events) if ('records' in event) break
    expect(letGo).toBe(true)
  })

  it.each([
    ['NDJSON', ndjson.mediaType, '', `${readingText}\n`],
    ['CSV', 'text/csv', `${csvHeader}\n`, `${csvRow}\n`],
    ['one endless line', ndjson.mediaType, '', 'x'.repeat(1_000)],
    ['one endless note', 'text/csv', `${csvHeader}\n${csvRow}"`, 'note\n'.repeat(200)],
  ])('of any length is not read ahead of: %s', async (_, mediaType, head, line) => {
    const { lineBytes } = INTAKE_LIMITS
    const chunk = Buffer.from(line.repeat(Math.ceil(64 * 1024 / line.length)))
    let sent = 0
    let kept = 0
    for await (const event of decodeSubmission({ mediaType, contentEncoding: null, chunks: (async function* () {
      yield Buffer.from(head)
      while (sent < 4 * 1024 * 1024) {
        sent += chunk.length
        yield chunk
      }
    })() }, INTAKE_LIMITS)) {
      if (!('records' in event)) continue
      kept = Math.max(kept, event.records.reduce((sum, { raw }) => sum + raw.length, 0))
      expect(event.records.length).toBeLessThanOrEqual(2_000)
    }
    expect(kept).toBeLessThanOrEqual(2 * 1024 * 1024 + lineBytes)
  })

  it('of the same readings as JSON, NDJSON and CSV gives the same content', async () => {
    const plain = reading(r => delete r.instrument.sequence)
    const all = [
      await decode(JSON.stringify({ readings: [plain] }), json),
      await decode(JSON.stringify(plain), ndjson),
      await decode(`${csvHeader}\n${csvRow}`),
    ]
    expect(new Set(all.map(({ readings }) => canonicalReading(readings[0]!))).size).toBe(1)
  })
})
