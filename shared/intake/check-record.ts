import { csvColumnAt } from './csv-columns'
import { cutText, quoteValue, type Refusal, type RefusalCode } from './refusal'
import type { RawRecord } from './raw-record'
import { validateRecord, type RecordCheck } from './validate-record'

/**
 * Holds a decoded record against the schema. Refusals carry the record's line.
 * Never throws.
 */
export function checkRecord(record: RawRecord): RecordCheck {
  if (record.refusals !== undefined) return { ok: false, refusals: record.refusals.map(refusal => placeRefusal(record, refusal)) }
  const check = validateRecord(record.value)
  return check.ok ? check : { ok: false, refusals: check.refusals.map(refusal => placeRefusal(record, refusal)) }
}

/** Names a place as the sender sees it: line, and for CSV the column and the cell instead of a pointer. */
export function placeRefusal(record: RawRecord, refusal: Refusal): Refusal {
  const placed = record.line === null || refusal.line !== undefined ? refusal : { ...refusal, line: record.line }
  if (record.format !== 'csv' || placed.pointer === undefined) return placed
  const { pointer, ...rest } = placed
  const column = csvColumnAt(pointer, record.value)
  if (column === undefined) return rest
  const cell = record.cells?.texts[record.cells.names.indexOf(column)]
  return { ...rest, ...wordsForColumn(rest.code, column), column, ...(cell === undefined || cell === '' ? {} : { value: quoteValue(cell) }) }
}

/** A sender of CSV knows columns, not members of an object. */
function wordsForColumn(code: RefusalCode, column: string): Partial<Refusal> {
  if (code === 'missing') return { reason: `The column ${column} holds no value.`, mend: 'Fill the cell.' }
  if (code === 'unknown-member') return { reason: `A subject of this kind has no ${column}.`, mend: 'Leave the cell empty, or correct subject_kind.' }
  return {}
}

/** The sender's own id, where the record has one that can be told. */
export function senderIdOf(record: RawRecord): string | null {
  const { value } = record
  if (typeof value !== 'object' || value === null || !Object.hasOwn(value, 'id')) return null
  const { id } = value as { id: unknown }
  return typeof id === 'string' && id.length > 0 ? cutText(id, 100) : null
}
