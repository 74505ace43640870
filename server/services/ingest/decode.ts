import { Readable, pipeline } from 'node:stream'
import { createGunzip } from 'node:zlib'
import { CsvDecoder, type CsvReport } from '#shared/intake/csv'
import { utf16Of } from '#shared/intake/csv-encoding'
import { decodeJson } from '#shared/intake/json'
import type { IntakeLimits } from '#shared/intake/limits'
import { joinBytes } from '#shared/intake/line-splitter'
import { formatOf, type IntakeFormat } from '#shared/intake/media-types'
import { NdjsonDecoder } from '#shared/intake/ndjson'
import type { RawRecord } from '#shared/intake/raw-record'
import { failWhole, type DecodeFailure } from '#shared/intake/refusal'
import { splitCsvFields } from './split-csv-fields'

export interface SubmissionBody {
  mediaType: string
  /** null, '' and identity: not compressed. */
  contentEncoding: string | null
  chunks: AsyncIterable<Uint8Array>
}

export interface DecodeReport {
  encoding: string
  delimiter: string | null
  extraColumns: string[]
}

export type DecodeEvent = { records: RawRecord[] } | { failure: DecodeFailure } | { report: DecodeReport }

/** Records handed out at once. */
const BATCH_RECORDS = 1_000
/** A batch is handed out sooner once its source text has this many characters. */
const BATCH_CHARACTERS = 2 * 1024 * 1024
/** Bytes decoded at once. */
const PIECE_BYTES = 64 * 1024

/**
 * Decodes a submission of any format. Records come in order and in batches of at most 2,000, so that
 * memory stays flat whatever the size. Then comes one report. A failure is the last event, and may come
 * after records have been handed out (the body is cut off, or turns out to be too long).
 * @throws whatever reading the chunks throws; nothing for any content of theirs
 */
export async function* decodeSubmission(body: SubmissionBody, limits: IntakeLimits): AsyncGenerator<DecodeEvent> {
  const format = formatOf(body.mediaType)
  if (format === undefined) {
    yield { failure: failWhole('media-type', { reason: `The media type ${body.mediaType.slice(0, 100)} is not one that is read.` }) }
    return
  }
  try {
    yield* decodeAs(format, pieces(inflated(body, format, limits)), limits)
  } catch (error) {
    if (!(error instanceof BodyFault)) throw error
    yield { failure: error.failure }
  }
}

/** Something about the body as a whole, met while its bytes were read. */
class BodyFault extends Error {
  override name = 'BodyFault'
  constructor(readonly failure: DecodeFailure) {
    super(failure.reason)
  }
}

function decodeAs(format: IntakeFormat, chunks: AsyncIterable<Uint8Array>, limits: IntakeLimits): AsyncGenerator<DecodeEvent> {
  if (format === 'json') return decodeJsonBody(chunks, limits)
  return format === 'ndjson' ? decodeNdjsonBody(chunks, limits) : decodeCsvBody(chunks, limits)
}

async function* decodeJsonBody(chunks: AsyncIterable<Uint8Array>, limits: IntakeLimits): AsyncGenerator<DecodeEvent> {
  const kept: Uint8Array[] = []
  let length = 0
  for await (const chunk of chunks) {
    kept.push(chunk)
    length += chunk.length
  }
  const decoding = decodeJson(joinBytes(kept, length), { maxReadings: limits.jsonReadings, depth: limits.jsonDepth })
  if (decoding.kind === 'failed') {
    yield { failure: decoding.failure }
    return
  }
  for (let at = 0; at < decoding.records.length; at += BATCH_RECORDS) yield { records: decoding.records.slice(at, at + BATCH_RECORDS) }
  yield { report: { encoding: 'utf-8', delimiter: null, extraColumns: [] } }
}

async function* decodeNdjsonBody(chunks: AsyncIterable<Uint8Array>, limits: IntakeLimits): AsyncGenerator<DecodeEvent> {
  const decoder = new NdjsonDecoder({ lineBytes: limits.lineBytes, depth: limits.jsonDepth })
  const batches = new Batches(limits.streamRecords)
  let isFirst = true
  for await (const chunk of chunks) {
    if (isFirst && utf16Of(chunk) !== undefined) throw new BodyFault(failWhole('encoding', { reason: 'The body is UTF-16; NDJSON is UTF-8.', place: 'byte 0' }))
    isFirst = false
    yield* batches.add(decoder.push(chunk))
  }
  yield* batches.add(decoder.end())
  yield* batches.finish('There is no line with a reading.')
  yield { report: { encoding: 'utf-8', delimiter: null, extraColumns: [] } }
}

async function* decodeCsvBody(chunks: AsyncIterable<Uint8Array>, limits: IntakeLimits): AsyncGenerator<DecodeEvent> {
  const source = await withHead(chunks)
  const workbook = kindOfWorkbook(source.head)
  if (workbook !== undefined) throw new BodyFault(failWhole('workbook', { reason: `This is ${workbook}, not CSV.`, place: 'byte 0' }))
  const utf16 = utf16Of(source.head)
  const decoder = new CsvDecoder(limits, splitCsvFields, utf16)
  const batches = new Batches(limits.streamRecords)
  for await (const chunk of utf16 === undefined ? source.chunks : transcoded(source.chunks, utf16)) {
    yield* batches.add(decoder.push(chunk))
    if (decoder.failure !== null) throw new BodyFault(decoder.failure)
  }
  yield* batches.add(decoder.end())
  if (decoder.failure !== null) throw new BodyFault(decoder.failure)
  yield* batches.finish(decoder.report().delimiter === null ? 'The file is empty.' : 'There is no row below the header.')
  yield { report: decoder.report() satisfies CsvReport }
}

/** Gathers records into batches, and stops where there are too many. */
class Batches {
  private records: RawRecord[] = []
  private characters = 0
  private count = 0

  constructor(private readonly most: number) {}

  * add(records: RawRecord[]): Generator<DecodeEvent> {
    for (const record of records) {
      if (this.count === this.most) {
        throw new BodyFault(failWhole('too-many-rows', { reason: `There are more than ${this.most} records.`, place: record.line === null ? null : `line ${record.line}` }))
      }
      this.count++
      this.records.push(record)
      this.characters += record.raw.length
      if (this.records.length >= BATCH_RECORDS || this.characters >= BATCH_CHARACTERS) yield this.handOut()
    }
  }

  * finish(emptyReason: string): Generator<DecodeEvent> {
    if (this.count === 0) throw new BodyFault(failWhole('empty', { reason: emptyReason }))
    if (this.records.length > 0) yield this.handOut()
  }

  private handOut(): DecodeEvent {
    const { records } = this
    this.records = []
    this.characters = 0
    return { records }
  }
}

/** The bytes of the body, inflated and counted. */
async function* inflated({ contentEncoding, chunks }: SubmissionBody, format: IntakeFormat, limits: IntakeLimits): AsyncGenerator<Uint8Array> {
  const coding = contentEncoding?.trim().toLowerCase() ?? ''
  const sentBound = format === 'json' ? limits.jsonBodyBytes : limits.streamBodyBytes
  const sent = counted(chunks, sentBound, 'too-large')
  if (coding === '' || coding === 'identity') {
    yield* sent
    return
  }
  if (coding !== 'gzip' && coding !== 'x-gzip') throw new BodyFault(failWhole('content-encoding', { reason: `The content encoding ${coding.slice(0, 40)} is not one that is understood.` }))
  const inflatedBound = format === 'json' ? limits.jsonBodyBytes : limits.inflatedBytes
  const gunzip = createGunzip()
  // The callback is there so that no error goes unhandled; the loop below throws the same one.
  pipeline(Readable.from(sent), gunzip, () => {})
  try {
    yield* counted(gunzip as AsyncIterable<Uint8Array>, inflatedBound, 'inflated-too-large')
  } catch (error) {
    if (isZlibError(error)) throw new BodyFault(failWhole('gzip', { reason: `The body is not complete gzip data: ${error.message}.` }))
    throw error
  } finally {
    gunzip.destroy()
  }
}

async function* counted(chunks: AsyncIterable<Uint8Array>, most: number, code: 'too-large' | 'inflated-too-large'): AsyncGenerator<Uint8Array> {
  let length = 0
  for await (const chunk of chunks) {
    length += chunk.length
    if (length > most) throw new BodyFault(failWhole(code, { reason: `The body is larger than ${most} bytes${code === 'inflated-too-large' ? ' once inflated' : ''}.` }))
    yield chunk
  }
}

function isZlibError(error: unknown): error is Error {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' && error.code.startsWith('Z_')
}

/** Small pieces, so that what one chunk decodes to stays small however large it is. */
async function* pieces(chunks: AsyncIterable<Uint8Array>): AsyncGenerator<Uint8Array> {
  for await (const chunk of chunks) {
    for (let at = 0; at < chunk.length; at += PIECE_BYTES) yield chunk.subarray(at, at + PIECE_BYTES)
  }
}

const HEAD_BYTES = 8

/** The first bytes, and all chunks with them. */
async function withHead(chunks: AsyncIterable<Uint8Array>): Promise<{ head: Uint8Array, chunks: AsyncIterable<Uint8Array> }> {
  const iterator = chunks[Symbol.asyncIterator]()
  const kept: Uint8Array[] = []
  let length = 0
  while (length < HEAD_BYTES) {
    const next = await iterator.next()
    if (next.done) break
    kept.push(next.value)
    length += next.value.length
  }
  const head = joinBytes(kept, length)
  return { head, chunks: resumed(head, iterator) }
}

async function* resumed(head: Uint8Array, iterator: AsyncIterator<Uint8Array>): AsyncGenerator<Uint8Array> {
  if (head.length > 0) yield head
  yield* { [Symbol.asyncIterator]: () => iterator }
}

/** By the first bytes: ZIP local file header, and the compound file of older workbooks. */
function kindOfWorkbook(head: Uint8Array): string | undefined {
  if (head[0] === 0x50 && head[1] === 0x4B && head[2] === 3 && head[3] === 4) return 'a workbook (or another ZIP archive)'
  if (head[0] === 0xD0 && head[1] === 0xCF && head[2] === 0x11 && head[3] === 0xE0) return 'a workbook of an older kind'
  return undefined
}

/** UTF-16 as UTF-8, without its byte-order mark. */
async function* transcoded(chunks: AsyncIterable<Uint8Array>, encoding: 'utf-16le' | 'utf-16be'): AsyncGenerator<Uint8Array> {
  const decoder = new TextDecoder(encoding, { fatal: true })
  const encoder = new TextEncoder()
  try {
    for await (const chunk of chunks) yield encoder.encode(decoder.decode(chunk, { stream: true }))
    yield encoder.encode(decoder.decode())
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    throw new BodyFault(failWhole('encoding', { reason: `The text begins as ${encoding.toUpperCase()}, but is not well-formed.` }))
  }
}
