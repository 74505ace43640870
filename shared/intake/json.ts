import { JsonSyntaxFault, TooManyElements, scanJson, type ScannedText, type ScannedValue } from './json-scan'
import { INTAKE_LIMITS } from './limits'
import type { RawRecord } from './raw-record'
import { failWhole, refuse, type DecodeFailure } from './refusal'
import { decodeUtf8, offsetOfUtf8Fault, withoutUtf8Mark } from './utf8'

/** Member of the body that holds many readings. */
export const READINGS_MEMBER = 'readings'

export type JsonDecoding = { kind: 'failed', failure: DecodeFailure } | { kind: 'records', records: RawRecord[] }

export interface JsonBounds {
  maxReadings: number
  depth?: number
}

/**
 * Decodes an `application/json` body: one reading, or `{ "readings": [ … ] }`. The dialect is I-JSON
 * (RFC 7493); a byte-order mark is dropped. An empty list fails as `empty`, as an empty body does.
 * Never throws. Faults inside one record refuse that record only.
 */
export function decodeJson(bytes: Uint8Array, bounds: JsonBounds): JsonDecoding {
  const text = decodeUtf8(withoutUtf8Mark(bytes))
  if (text === undefined) {
    return failed(failWhole('encoding', { reason: 'The body is not UTF-8.', place: `byte ${offsetOfUtf8Fault(bytes)}` }))
  }
  if (!/[^ \t\r\n]/.test(text)) return failed(failWhole('empty', { reason: 'The body is empty.' }))
  const { maxReadings, depth = INTAKE_LIMITS.jsonDepth } = bounds
  let scanned: ScannedText
  try {
    scanned = scanJson(text, { depth, listMember: READINGS_MEMBER, mostElements: maxReadings })
  } catch (error) {
    if (error instanceof JsonSyntaxFault) return failed(failWhole('syntax', { reason: error.message, place: placeInText(text, error.offset) }))
    if (error instanceof TooManyElements) return failed(failWhole('too-many-readings', { reason: `The body holds more than ${maxReadings} readings.` }))
    throw error
  }
  return scanned.rootMembers.includes(READINGS_MEMBER)
    ? decodeList(text, scanned)
    : { kind: 'records', records: [toRecord(text, scanned.root, 1)] }
}

function decodeList(text: string, scanned: ScannedText): JsonDecoding {
  const [fault] = scanned.root.refusals
  if (fault !== undefined) return failed(failWhole(fault.code, { reason: fault.reason, place: fault.pointer ?? null }))
  const other = scanned.rootMembers.find(name => name !== READINGS_MEMBER)
  if (other !== undefined) {
    return failed(failWhole('unknown-member', { reason: `Beside "${READINGS_MEMBER}" the body has a member ${JSON.stringify(other.slice(0, 100))}.` }))
  }
  if (scanned.elements === null) return failed(failWhole('type', { reason: `"${READINGS_MEMBER}" is not a list.`, place: `/${READINGS_MEMBER}` }))
  if (scanned.elements.length === 0) return failed(failWhole('empty', { reason: `The list "${READINGS_MEMBER}" is empty.` }))
  return { kind: 'records', records: scanned.elements.map((element, index) => toRecord(text, element, index + 1)) }
}

function toRecord(text: string, scanned: ScannedValue, ordinal: number): RawRecord {
  const raw = text.slice(scanned.start, scanned.end)
  const record: RawRecord = { ordinal, line: null, value: undefined, raw, format: 'json' }
  if (scanned.refusals.length > 0) record.refusals = scanned.refusals
  else record.value = JSON.parse(raw)
  return record
}

/** Decodes one line of NDJSON, or any one reading; a fault becomes the record's own refusal. */
export function decodeJsonRecord(text: string, ordinal: number, line: number | null, depth: number = INTAKE_LIMITS.jsonDepth): RawRecord {
  try {
    const { root } = scanJson(text, { depth })
    return { ...toRecord(text, root, ordinal), line, raw: text }
  } catch (error) {
    if (!(error instanceof JsonSyntaxFault)) throw error
    const refusal = refuse('syntax', {
      reason: `${error.message} (character ${error.offset + 1})`,
      pointer: '',
      value: text.slice(Math.max(0, error.offset - 20), error.offset + 20),
    })
    if (line !== null) refusal.line = line
    return { ordinal, line, value: undefined, raw: text, format: 'json', refusals: [refusal] }
  }
}

/** Line and column as an editor counts them, from 1; columns in UTF-16 code units. */
export function placeInText(text: string, offset: number): string {
  let line = 1
  let lineStart = 0
  for (let at = 0; at < offset; at++) {
    const code = text.charCodeAt(at)
    if (code === 0x0A || (code === 0x0D && text.charCodeAt(at + 1) !== 0x0A)) {
      line++
      lineStart = at + 1
    }
  }
  return `line ${line}, column ${offset - lineStart + 1}`
}

function failed(failure: DecodeFailure): JsonDecoding {
  return { kind: 'failed', failure }
}
