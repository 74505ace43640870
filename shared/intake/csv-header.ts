import { csvColumns, csvColumnsByName, type CsvColumn } from './csv-columns'
import { followQuotes } from './csv-quotes'
import { INTAKE_LIMITS } from './limits'
import { failWhole, type DecodeFailure } from './refusal'

export const CSV_DELIMITERS = [',', ';', '\t'] as const
export type CsvDelimiter = (typeof CSV_DELIMITERS)[number]

export interface CsvHeader {
  delimiter: CsvDelimiter
  /** Names as they are told back: known ones in their own spelling, others as sent. */
  names: readonly string[]
  /** Place of each known column that the header names, in the order of the column table. */
  known: readonly { column: CsvColumn, index: number }[]
  /** Place of each column that the schema doesn't know. */
  extras: readonly { name: string, index: number }[]
}

/**
 * Splits whole, well-quoted CSV records (RFC 4180) into fields. Given from outside, since the parser in
 * use needs Node.
 */
export type SplitCsvFields = (records: readonly string[], delimiter: CsvDelimiter) => string[][]

/** Longest name of a column. */
const MOST_NAME = 100

/**
 * Reads the header row and finds the delimiter by it: the one that yields the most known names.
 * Names are compared without regard to capitals and spaces around them.
 */
export function readCsvHeader(text: string, line: number, split: SplitCsvFields): { ok: true, header: CsvHeader } | { ok: false, failure: DecodeFailure } {
  const place = `line ${line}`
  const { delimiter, cells } = bestSplit(text, split)
  if (cells === undefined) return { ok: false, failure: failWhole('header', { reason: 'The quotes of the header row are broken.', place }) }
  const names = cells.map((cell, index) => nameOf(cell, index))
  const known = csvColumns.map(column => ({ column, index: names.indexOf(column.name) })).filter(({ index }) => index >= 0)
  const missing = csvColumns.filter(column => column.required && !known.some(entry => entry.column === column)).map(column => column.name)
  if (!known.some(({ column }) => column.substance !== undefined)) missing.push('a percentage such as r134a_pct')
  if (missing.length > 0) {
    return { ok: false, failure: failWhole('header', {
      reason: `The first row does not name the columns needed. Found: ${names.slice(0, 40).map(name => name.slice(0, 40)).join(', ').slice(0, 400)}. Missing: ${missing.join(', ')}.`,
      mend: `Begin with a header row. Expected columns, in any order: ${csvColumns.map(column => column.name).join(', ')}.`,
      place,
    }) }
  }
  if (names.length > INTAKE_LIMITS.csvColumns) return { ok: false, failure: failWhole('header', { reason: `The header names ${names.length} columns; at most ${INTAKE_LIMITS.csvColumns} are read.`, place }) }
  const twice = names.find((name, index) => names.indexOf(name) < index)
  if (twice !== undefined) return { ok: false, failure: failWhole('duplicate-column', { reason: `The column "${twice.slice(0, MOST_NAME)}" stands twice in the header.`, place: `${place}, column ${names.lastIndexOf(twice) + 1}` }) }
  const unfit = names.findIndex(name => name.length > MOST_NAME || /[\u0000-\u001f\ud800-\udfff]/u.test(name))
  if (unfit >= 0) return { ok: false, failure: failWhole('header', { reason: `The name of column ${unfit + 1} is longer than ${MOST_NAME} characters or holds control characters.`, place: `${place}, column ${unfit + 1}` }) }
  const extras = names.flatMap((name, index) => csvColumnsByName.has(name) ? [] : [{ name, index }])
  return { ok: true, header: { delimiter, names, known, extras } }
}

function bestSplit(text: string, split: SplitCsvFields): { delimiter: CsvDelimiter, cells: string[] | undefined } {
  let best: { delimiter: CsvDelimiter, cells: string[] | undefined, known: number } | undefined
  for (const delimiter of CSV_DELIMITERS) {
    const cells = followQuotes(text, delimiter, false) === 'closed' ? split([text], delimiter)[0] : undefined
    const known = cells === undefined ? -1 : cells.filter((cell, index) => csvColumnsByName.has(nameOf(cell, index))).length
    const better = best === undefined || known > best.known || (known === best.known && (cells?.length ?? 0) > (best.cells?.length ?? 0))
    if (better) best = { delimiter, cells, known }
  }
  return best!
}

/** A known name in its own spelling, another as sent; a column without a name is called by its number. */
function nameOf(cell: string, index: number): string {
  const name = cell.trim()
  if (name === '') return `column ${index + 1}`
  const lower = name.toLowerCase()
  return csvColumnsByName.has(lower) ? lower : name
}
