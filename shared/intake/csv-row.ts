import type { Substance } from '../refrigerants/designations'
import { TEXT_GUARD, unguardText, type CsvColumn } from './csv-columns'
import type { CsvHeader } from './csv-header'
import { INTAKE_LIMITS } from './limits'
import type { RawRecord } from './raw-record'
import { READING_SCHEMA } from './reading-schema'
import { refuse, type Refusal } from './refusal'

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/
const COMMA_NUMBER = /^[+-]?(?:\d+,\d*|,\d+)(?:[eE][+-]?\d+)?$/

export interface CsvRow {
  cells: readonly string[]
  line: number
  raw: string
}

/**
 * Turns the cells of one row into a record of the same shape as a JSON reading. Cells that are no
 * numbers, and rows with too few or too many cells, are refused here; everything else is left to the schema.
 * Forms taken: `99.4`, `99.4%`, `99.4 %`, `<0.3`, `< 0.3`; with `;` or tab as delimiter also `99,4`.
 * An empty cell means that there is no value.
 */
export function csvRowToRecord(row: CsvRow, header: CsvHeader, ordinal: number): RawRecord {
  const { cells, line, raw } = row
  const record: RawRecord = { ordinal, line, value: undefined, raw, format: 'csv', cells: { names: header.names, texts: cells } }
  if (cells.length !== header.names.length) {
    record.refusals = [refuseCount(row, header)]
    return record
  }
  const refusals: Refusal[] = []
  const guardColumn = header.known.find(({ column }) => column.kind === 'guard')
  const guarded = guardColumn !== undefined && cells[guardColumn.index]!.trim() === TEXT_GUARD
  if (guardColumn !== undefined && !guarded && cells[guardColumn.index]!.trim() !== '') {
    refusals.push(refuse('choice', { line, column: 'text_guard', value: cells[guardColumn.index], mend: `Write ${TEXT_GUARD}, or leave the cell empty.` }))
  }

  const members = new Map<string, string | number>()
  const parts: { substance: Substance, percent: number, qualifier?: '<' }[] = []
  for (const { column, index } of header.known) {
    const cell = cells[index]!
    if (cell.length > INTAKE_LIMITS.fieldCharacters) {
      refusals.push(refuseLength(column.name, cell, line))
      continue
    }
    const text = column.kind === 'text' ? (guarded ? unguardText(cell) : cell) : cell.trim()
    if (text === '' || column.kind === 'guard') continue
    if (column.kind === 'text' || column.kind === 'word') {
      members.set(column.pointer, text)
      continue
    }
    const number = readNumber(text, column, header.delimiter !== ',')
    if ('code' in number) {
      refusals.push(refuse(number.code, { line, column: column.name, value: cell, reason: number.reason }))
      continue
    }
    if (column.substance !== undefined) {
      parts.push(number.below ? { substance: column.substance, percent: number.value, qualifier: '<' } : { substance: column.substance, percent: number.value })
      continue
    }
    members.set(column.pointer, number.value)
    if (number.below) members.set('/composition/airQualifier', '<')
  }
  const extras = readExtras(cells, header, guarded, line, refusals)
  if (extras !== undefined) record.extras = extras
  if (parts.length === 0 && refusals.length === 0) {
    refusals.push(refuse('missing', { line, reason: 'None of the percentage columns holds a value.', mend: 'Fill in what the instrument showed.' }))
  }
  if (refusals.length > 0) record.refusals = refusals
  record.value = toReading(members, parts)
  return record
}

type CellNumber = { value: number, below: boolean } | { code: 'number' | 'range', reason: string }

function readNumber(text: string, column: CsvColumn, commaAllowed: boolean): CellNumber {
  let digits = text
  let below = false
  if (column.kind === 'percent') {
    if (digits.startsWith('<')) {
      below = true
      digits = digits.slice(1).trim()
    }
    if (digits.endsWith('%')) digits = digits.slice(0, -1).trim()
  }
  if (COMMA_NUMBER.test(digits)) {
    if (!commaAllowed) return { code: 'number', reason: `"${text.slice(0, 40)}" has a decimal comma, which is read only where the delimiter is ; or tab.` }
    digits = digits.replace(',', '.')
  }
  if (!NUMBER.test(digits)) return { code: 'number', reason: `"${text.slice(0, 40)}" is not a number.` }
  const value = Number(digits)
  if (!Number.isFinite(value) || (/^[+-]?\d+$/.test(digits) && !Number.isSafeInteger(value))) return { code: 'range', reason: 'The number is too large to be held exactly.' }
  return { value, below }
}

function readExtras(cells: readonly string[], header: CsvHeader, guarded: boolean, line: number, refusals: Refusal[]): Record<string, string> | undefined {
  let extras: Record<string, string> | undefined
  for (const { name, index } of header.extras) {
    const cell = guarded ? unguardText(cells[index]!) : cells[index]!
    if (cell === '') continue
    if (cell.length > INTAKE_LIMITS.fieldCharacters) refusals.push(refuseLength(name, cell, line))
    else if (cell.includes('\u0000')) refusals.push(refuse('bad-character', { line, column: name, value: cell }))
    else {
      // Without a prototype a column may be called __proto__ and is still only a name.
      extras ??= Object.create(null) as Record<string, string>
      extras[name] = cell
    }
  }
  return extras
}

function refuseLength(column: string, cell: string, line: number): Refusal {
  return refuse('field-too-long', { line, column, value: cell, reason: `The field has ${cell.length} characters; at most ${INTAKE_LIMITS.fieldCharacters} are read.` })
}

function refuseCount({ cells, line, raw }: CsvRow, header: CsvHeader): Refusal {
  const difference = cells.length - header.names.length
  const reason = `The row has ${cells.length} fields, ${Math.abs(difference)} too ${difference > 0 ? 'many' : 'few'}: the header names ${header.names.length} columns.`
  const splitNumber = difference > 0 && header.delimiter === ',' && cells.some((cell, index) => /^<?\s*-?\d{1,3}$/.test(cell) && /^\d{1,3}\s*%?$/.test(cells[index + 1] ?? ''))
  if (!splitNumber) return refuse('column-count', { line, reason, value: raw })
  return refuse('column-count', { line, reason, value: raw, mend: 'A decimal comma may have cut a number in two: use a decimal point, or ; or tab as delimiter.' })
}

/** Puts members at their pointers; only pointers of the column table come here. */
function toReading(members: ReadonlyMap<string, string | number>, parts: unknown[]): unknown {
  const reading: Record<string, unknown> = { schema: READING_SCHEMA, instrument: {}, subject: {}, composition: {} }
  for (const [pointer, value] of members) {
    const [, first, second] = pointer.split('/') as [string, string, string | undefined]
    if (second === undefined) reading[first] = value
    else ((reading[first] ??= {}) as Record<string, unknown>)[second] = value
  }
  ;(reading.composition as Record<string, unknown>).parts = parts
  return reading
}
