import { decodeJsonRecord } from './json'
import { LineSplitter, type ByteLine } from './line-splitter'
import type { RawRecord } from './raw-record'
import { cutText, refuse, type Refusal } from './refusal'
import { decodeUtf8, offsetOfUtf8Fault, withoutUtf8Mark } from './utf8'

export interface NdjsonBounds {
  lineBytes: number
  depth: number
}

const lenient = new TextDecoder('utf-8')

/**
 * Decodes newline-delimited JSON as it comes, one reading a line, however the bytes are chunked. Lines
 * end with LF or CR LF; blank lines are counted and skipped. A line that is too long, not UTF-8 or not
 * JSON is one refused record; its neighbours are read.
 */
export class NdjsonDecoder {
  private readonly lines: LineSplitter
  private ordinal = 0
  private records: RawRecord[] = []

  constructor(private readonly bounds: NdjsonBounds) {
    this.lines = new LineSplitter({ mostBytes: bounds.lineBytes, carriageReturnEnds: false })
  }

  /** The records that the chunk completes. */
  push(chunk: Uint8Array): RawRecord[] {
    this.lines.push(chunk, this.take)
    return this.handOut()
  }

  /** The record of a last line without ending. */
  end(): RawRecord[] {
    this.lines.end(this.take)
    return this.handOut()
  }

  private readonly take = (line: ByteLine): void => {
    const record = this.decode(line)
    if (record !== undefined) this.records.push(record)
  }

  private decode({ line, bytes, tooLong }: ByteLine): RawRecord | undefined {
    if (tooLong) {
      return this.refuseLine(line, bytes, refuse('line-too-long', { line, pointer: '', reason: `The line is longer than ${this.bounds.lineBytes} bytes.`, value: lenient.decode(bytes.subarray(0, 1_000)) }))
    }
    const text = decodeUtf8(line === 1 ? withoutUtf8Mark(bytes) : bytes)
    if (text === undefined) {
      return this.refuseLine(line, bytes, refuse('encoding', { line, pointer: '', reason: `The line is not UTF-8 from its byte ${offsetOfUtf8Fault(bytes) + 1} on.`, value: lenient.decode(bytes.subarray(0, 1_000)) }))
    }
    if (!/[^ \t\r]/.test(text)) return undefined
    return decodeJsonRecord(text, ++this.ordinal, line, this.bounds.depth)
  }

  private refuseLine(line: number, bytes: Uint8Array, refusal: Refusal): RawRecord {
    const raw = lenient.decode(bytes)
    return { ordinal: ++this.ordinal, line, value: undefined, raw: cutText(raw, raw.length), format: 'json', refusals: [refusal] }
  }

  private handOut(): RawRecord[] {
    const { records } = this
    this.records = []
    return records
  }
}
