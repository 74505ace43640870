import { TEXT_GUARD, csvColumns, guardText, type CsvColumn } from './csv-columns'
import type { PurityReading } from './reading-schema'

export interface CsvExportRow {
  reading: PurityReading
  extras?: Readonly<Record<string, string>>
}

/**
 * Writes readings as CSV (RFC 4180, comma, CR LF, all documented columns), line by line, header first.
 * Texts that a spreadsheet would run get an apostrophe in front, and the row says so in `text_guard`, so
 * that reading the file in again gives every text back exactly.
 * @param extraColumns further columns, by name; taken from the extras of each row
 */
export function* readingsToCsv(rows: Iterable<CsvExportRow>, extraColumns: readonly string[] = []): Generator<string> {
  yield line([...csvColumns.map(column => column.name), ...extraColumns])
  for (const { reading, extras } of rows) yield csvLineOf(reading, extras, extraColumns)
}

function csvLineOf(reading: PurityReading, extras: Readonly<Record<string, string>> | undefined, extraColumns: readonly string[]): string {
  let guarded = false
  const guard = (text: string): string => {
    const safe = guardText(text)
    if (safe !== text) guarded = true
    return safe
  }
  const cells = csvColumns.map(column => column.kind === 'text' ? guard(textOf(reading, column)) : textOf(reading, column))
  const extraCells = extraColumns.map(name => guard(extras !== undefined && Object.hasOwn(extras, name) ? extras[name]! : ''))
  if (guarded) cells[csvColumns.findIndex(column => column.kind === 'guard')] = TEXT_GUARD
  return line([...cells, ...extraCells])
}

function textOf(reading: PurityReading, column: CsvColumn): string {
  if (column.kind === 'guard') return ''
  const { composition } = reading
  if (column.substance !== undefined) {
    const part = composition.parts.find(part => part.substance === column.substance)
    return part === undefined ? '' : percentText(part.percent, part.qualifier)
  }
  if (column.pointer === '/composition/airPercent') return composition.airPercent === undefined ? '' : percentText(composition.airPercent, composition.airQualifier)
  let value: unknown = reading
  for (const step of column.pointer.slice(1).split('/')) value = (value as Record<string, unknown> | undefined)?.[step]
  return value === undefined ? '' : String(value)
}

function percentText(percent: number, qualifier: '<' | undefined): string {
  return `${qualifier ?? ''}${percent}`
}

function line(cells: readonly string[]): string {
  return `${cells.map(quoted).join(',')}\r\n`
}

function quoted(cell: string): string {
  return /[",\r\n]|^\s|\s$/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell
}
