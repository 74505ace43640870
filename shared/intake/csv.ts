import { LineTextDecoder, type CsvEncoding } from './csv-encoding'
import { readCsvHeader, type CsvDelimiter, type CsvHeader, type SplitCsvFields } from './csv-header'
import { followQuotes } from './csv-quotes'
import { csvRowToRecord } from './csv-row'
import { LineSplitter, type ByteLine } from './line-splitter'
import type { RawRecord } from './raw-record'
import { cutText, refuse, type DecodeFailure, type Refusal } from './refusal'
import { withoutUtf8Mark } from './utf8'

export interface CsvBounds {
  /** Bytes of a line; also characters of a record with the line breaks inside its quotes. */
  lineBytes: number
  fieldCharacters: number
}

export interface CsvReport {
  encoding: CsvEncoding
  delimiter: CsvDelimiter | null
  extraColumns: string[]
}

/** More lines than this hang in no quotes that are meant: the longest text that a reading has is 2,000 characters. */
const MOST_OPEN_LINES = 2_000

interface TextLine {
  line: number
  text: string
  ending: string
}

/** A record whose fields have yet to be split, or that is refused as it stands. */
interface CsvEntry {
  line: number
  raw: string
  refusal?: Refusal
}

/**
 * Decodes CSV (RFC 4180) as it comes, however the bytes are chunked: UTF-8 or Windows-1252, lines ending
 * with CR LF, LF or CR, the three even mixed. UTF-16 must have been turned into UTF-8 before.
 *
 * A row with broken quotes is one refused record. Where a quote is never closed, the line that opened it
 * is refused and the lines after it are read again as rows of their own, so that nothing is swallowed.
 */
export class CsvDecoder {
  /** Set once the header could not be read; nothing more is decoded then. */
  failure: DecodeFailure | null = null
  private header: CsvHeader | null = null
  private ordinal = 0
  /** Lines of a record whose quotes are still open. */
  private open: TextLine[] = []
  private openLength = 0
  private entries: CsvEntry[] = []
  private readonly lines: LineSplitter
  private readonly text: LineTextDecoder

  constructor(private readonly bounds: CsvBounds, private readonly split: SplitCsvFields, private readonly transcodedFrom?: 'utf-16le' | 'utf-16be') {
    this.lines = new LineSplitter({ mostBytes: bounds.lineBytes, carriageReturnEnds: true })
    this.text = new LineTextDecoder(transcodedFrom === undefined ? undefined : 'utf-8')
  }

  report(): CsvReport {
    return {
      encoding: this.transcodedFrom ?? this.text.encoding ?? 'utf-8',
      delimiter: this.header?.delimiter ?? null,
      extraColumns: this.header?.extras.map(({ name }) => name) ?? [],
    }
  }

  /** The records that the chunk completes. */
  push(chunk: Uint8Array): RawRecord[] {
    this.lines.push(chunk, this.take)
    return this.handOut()
  }

  /** The records of the end: a last line without ending, and what an open quote held back. */
  end(): RawRecord[] {
    this.lines.end(this.take)
    while (this.open.length > 0) this.giveUpOpenQuote(`The quote that opens in line ${this.open[0]!.line} is never closed.`)
    return this.handOut()
  }

  private readonly take = (line: ByteLine): void => {
    if (this.failure !== null) return
    const { text, fault } = this.text.decode(line.line === 1 ? withoutUtf8Mark(line.bytes) : line.bytes)
    if (this.header === null) {
      this.takeHeader(line, text, fault)
      return
    }
    const refusal = line.tooLong ? this.refuseLong(line.line, text) : fault ? this.refuseEncoding(line.line, text) : undefined
    if (refusal === undefined) {
      this.takeLine({ line: line.line, text, ending: line.ending })
      return
    }
    while (this.open.length > 0) this.giveUpOpenQuote(`The quote that opens in line ${this.open[0]!.line} is not closed before line ${line.line}, which could not be read.`)
    this.entries.push({ line: line.line, raw: text, refusal })
  }

  private takeHeader(line: ByteLine, text: string, fault: boolean): void {
    if (text.trim() === '') return
    const result = readCsvHeader(text, line.line, this.split)
    if (fault) this.failure = { ...this.refuseEncoding(line.line, text), place: `line ${line.line}` }
    else if (!result.ok) this.failure = result.failure
    else this.header = result.header
  }

  private takeLine(line: TextLine): void {
    const inside = this.open.length > 0
    const state = line.text.includes('"') ? followQuotes(line.text, this.header!.delimiter, inside) : inside ? 'open' : 'closed'
    if (state === 'broken' && inside) {
      this.giveUpOpenQuote(`The quote that opens in line ${this.open[0]!.line} is not closed in a way that can be read.`)
      this.takeLine(line)
    } else if (state === 'broken') {
      this.entries.push({ line: line.line, raw: line.text, refusal: refuse('quote', { line: line.line, value: line.text, reason: 'A quote stands inside a field without quotes, or text follows a closing quote.' }) })
    } else if (state === 'open') {
      this.open.push(line)
      this.openLength += line.text.length + line.ending.length
      this.lines.keepEmpty = true
      if (this.openLength > this.bounds.lineBytes || this.open.length > MOST_OPEN_LINES) {
        this.giveUpOpenQuote(`The quote that opens in line ${this.open[0]!.line} is not closed within ${MOST_OPEN_LINES} lines or ${this.bounds.lineBytes} characters.`)
      }
    } else if (inside) {
      const first = this.open[0]!
      const raw = this.open.map(({ text, ending }) => text + ending).join('') + line.text
      this.closeOpen()
      this.entries.push({ line: first.line, raw })
    } else if (line.text.trim() !== '') this.entries.push({ line: line.line, raw: line.text })
  }

  /** Refuses the line that opened the quote, and reads the lines after it anew. */
  private giveUpOpenQuote(reason: string): void {
    const [first, ...rest] = this.open as [TextLine, ...TextLine[]]
    this.closeOpen()
    this.entries.push({ line: first.line, raw: first.text, refusal: refuse('quote', {
      line: first.line,
      value: first.text,
      reason: rest.length === 0 ? `${reason} This row could not be read.` : `${reason} This row could not be read; the ${rest.length} lines after it were read as rows of their own.`,
    }) })
    for (const line of rest) this.takeLine(line)
  }

  private closeOpen(): void {
    this.open = []
    this.openLength = 0
    this.lines.keepEmpty = false
  }

  private refuseEncoding(line: number, text: string): Refusal {
    return refuse('encoding', { line, value: text, reason: 'The line is not UTF-8, though lines before it are.' })
  }

  private refuseLong(line: number, text: string): Refusal {
    const { delimiter, names } = this.header!
    const field = text.split(delimiter).findIndex(piece => piece.length > this.bounds.fieldCharacters)
    if (field < 0) return refuse('line-too-long', { line, value: text, reason: `The line is longer than ${this.bounds.lineBytes} bytes.`, mend: 'Give each reading a line of its own.' })
    const column = names[field]
    return refuse('field-too-long', { line, ...(column === undefined ? {} : { column }), value: text.split(delimiter)[field], reason: `A field is longer than ${this.bounds.fieldCharacters} characters.` })
  }

  private handOut(): RawRecord[] {
    const { entries, header } = this
    if (entries.length === 0) return []
    this.entries = []
    const whole = entries.filter(({ refusal }) => refusal === undefined)
    const rows = this.split(whole.map(({ raw }) => raw), header!.delimiter)
    if (rows.length !== whole.length) throw new Error(`${whole.length} CSV records were split into ${rows.length}`)
    const records: RawRecord[] = []
    let row = 0
    for (const { line, raw, refusal } of entries) {
      // A NUL that came with the row can't be stored with it; the cell that holds it is refused by itself.
      const kept = raw.includes('\u0000') ? cutText(raw, raw.length) : raw
      if (refusal !== undefined) {
        records.push({ ordinal: ++this.ordinal, line, value: undefined, raw: kept, format: 'csv', refusals: [refusal] })
        continue
      }
      const cells = rows[row++]!
      // Spreadsheets leave rows of nothing but delimiters below a table.
      if (cells.every(cell => cell.trim() === '')) continue
      records.push(csvRowToRecord({ cells, line, raw: kept }, header!, ++this.ordinal))
    }
    return records
  }
}
