import { cutText, type Refusal } from './refusal'
import type { RawRecord } from './raw-record'
import { validateRecord, type RecordCheck } from './validate-record'

/**
 * Holds a decoded record against the schema. Refusals carry the record's line.
 * Never throws.
 */
export function checkRecord(record: RawRecord): RecordCheck {
  if (record.refusals !== undefined) return { ok: false, refusals: record.refusals.map(refusal => placeIn(record, refusal)) }
  const check = validateRecord(record.value)
  return check.ok ? check : { ok: false, refusals: check.refusals.map(refusal => placeIn(record, refusal)) }
}

function placeIn(record: RawRecord, refusal: Refusal): Refusal {
  return record.line === null || refusal.line !== undefined ? refusal : { ...refusal, line: record.line }
}

/** The sender's own id, where the record has one that can be told. */
export function senderIdOf(record: RawRecord): string | null {
  const { value } = record
  if (typeof value !== 'object' || value === null || !Object.hasOwn(value, 'id')) return null
  const { id } = value as { id: unknown }
  return typeof id === 'string' && id.length > 0 ? cutText(id, 100) : null
}
