import { REFUSED_VALUE_LENGTH } from './limits'

/**
 * Why something could not be taken. The list is closed and published: programs may branch on the codes.
 * `scope`: whether it concerns one record, the whole submission, or may be either.
 */
export const REFUSALS = {
  'type': { scope: 'either', reason: 'The value is of another kind than expected.', mend: 'Send the kind of value that the schema names for this place.' },
  'missing': { scope: 'record', reason: 'A required value is missing.', mend: 'Send the value.' },
  'unknown-member': { scope: 'either', reason: 'The schema has no member of this name here.', mend: 'Take the member out, or correct its name: names are exact, capitals included.' },
  'schema': { scope: 'record', reason: 'The version of the schema is not one that is understood.', mend: 'Send "purity-reading/1" as schema.' },
  'choice': { scope: 'record', reason: 'The value is not one of those allowed.', mend: 'Send one of the allowed values, spelt exactly.' },
  'range': { scope: 'record', reason: 'The number is outside its range.', mend: 'Check the number and its unit.' },
  'number': { scope: 'record', reason: 'This is not a number.', mend: 'Write digits with one decimal mark, leave the cell empty where nothing was measured, and put < before a detection limit.' },
  'length': { scope: 'record', reason: 'The text is too short or too long.', mend: 'Keep the text within the length allowed.' },
  'blank': { scope: 'record', reason: 'The text holds nothing but spaces.', mend: 'Send the text, or leave the member out.' },
  'bad-character': { scope: 'record', reason: 'The text holds a character that cannot be kept: NUL or half of a surrogate pair.', mend: 'Send the text as UTF-8 without NUL characters.' },
  'time': { scope: 'record', reason: 'This is not a time with an offset on a day that exists.', mend: 'Write the time as 2026-03-14T09:26:53-05:00 (RFC 3339), with Z or an offset.' },
  'unknown-substance': { scope: 'record', reason: 'The designation is not in the catalogue.', mend: 'Use the exact designation, for example R-134a.' },
  'duplicate-substance': { scope: 'record', reason: 'The substance stands twice in the composition.', mend: 'Report each substance once.' },
  'subject': { scope: 'record', reason: 'Nothing tells which vehicle was sampled.', mend: 'Send at least one of vin, plate and workOrder.' },
  'instrument': { scope: 'record', reason: 'The device token speaks for another instrument.', mend: 'Send the reading with the token of its own instrument.' },
  'pressure': { scope: 'record', reason: 'A pressure needs its kind, and a kind its pressure.', mend: 'Send pressureKilopascal together with pressureKind "gauge" or "absolute".' },
  'sum': { scope: 'record', reason: 'The percentages do not add up to 100.', mend: 'Check the percentages, the display resolution, and whether air is counted apart or within.' },
  'nothing-found': { scope: 'record', reason: 'No refrigerant was found: every part is 0 or below detection.', mend: 'Sample again; a reading without refrigerant says nothing about purity.' },
  'duplicate-member': { scope: 'either', reason: 'The same member stands twice in one object.', mend: 'Send each member once.' },
  'too-deep': { scope: 'either', reason: 'Objects and lists are nested too deeply.', mend: 'Send the reading as the schema shows it.' },
  'syntax': { scope: 'either', reason: 'This is not valid JSON.', mend: 'Let a JSON library write the text.' },
  'encoding': { scope: 'either', reason: 'The bytes are not text in the expected encoding.', mend: 'Send UTF-8.' },
  'line-too-long': { scope: 'record', reason: 'The line is too long.', mend: 'Send one reading on each line.' },
  'field-too-long': { scope: 'record', reason: 'The field is too long.', mend: 'Shorten the text of the field.' },
  'column-count': { scope: 'record', reason: 'The row has another number of fields than the header.', mend: 'Give the row one field for each column; a comma inside a field needs quotes around the field.' },
  'quote': { scope: 'record', reason: 'The quotes of the row are broken.', mend: 'Put the whole field in quotes and double each quote inside it.' },
  'conflict': { scope: 'record', reason: 'The same id came before with other content.', mend: 'Give a new reading a new id; settle the conflict in the submission if the content was corrected.' },

  'empty': { scope: 'submission', reason: 'There is no reading in the submission.', mend: 'Send at least one reading.' },
  'too-many-readings': { scope: 'submission', reason: 'The body holds too many readings.', mend: 'Send fewer readings in a body, or send NDJSON.' },
  'too-many-rows': { scope: 'submission', reason: 'The submission holds too many records.', mend: 'Split the submission.' },
  'header': { scope: 'submission', reason: 'The first row does not name the columns.', mend: 'Begin with a header row that names the columns as documented.' },
  'duplicate-column': { scope: 'submission', reason: 'A column stands twice in the header.', mend: 'Name each column once.' },
  'workbook': { scope: 'submission', reason: 'This is a workbook, not CSV.', mend: 'Save the sheet as CSV and send that.' },
  'gzip': { scope: 'submission', reason: 'The body is not complete gzip data.', mend: 'Compress the whole body with gzip, or send it without Content-Encoding.' },
  'too-large': { scope: 'submission', reason: 'The body is too large.', mend: 'Split the submission.' },
  'inflated-too-large': { scope: 'submission', reason: 'The body is too large once inflated.', mend: 'Split the submission.' },
  'media-type': { scope: 'submission', reason: 'The media type is not one that is read.', mend: 'Send application/json, application/x-ndjson or text/csv, and say so in Content-Type.' },
  'content-encoding': { scope: 'submission', reason: 'The content encoding is not one that is understood.', mend: 'Send the body as it is or compressed with gzip.' },
} as const satisfies Record<string, { scope: 'record' | 'submission' | 'either', reason: string, mend: string }>

export type RefusalCode = keyof typeof REFUSALS

/** Why one record was refused, where in it, and how to mend it. */
export interface Refusal {
  code: RefusalCode
  reason: string
  mend: string
  /** JSON Pointer (RFC 6901) within the record; '' is the record itself. */
  pointer?: string
  /** Name of the CSV column. */
  column?: string
  /** Line as an editor counts it, from 1. */
  line?: number
  /** As sent, cut to 200 characters. */
  value?: string
}

/** Why a submission could not be read as a whole. */
export interface DecodeFailure {
  code: RefusalCode
  reason: string
  mend: string
  /** Line and column, or byte offset; null where the whole is meant. */
  place: string | null
}

/** Names that a sender chose stand in reasons and places; they must not make a refusal large. */
const TEXT_LENGTH = 1_000

/** NUL, and half of a surrogate pair standing alone (with the `u` flag a whole pair does not match). */
const UNSTORABLE = /[\u0000\ud800-\udfff]/gu

type RefusalDetail = Partial<Omit<Refusal, 'code' | 'value'>> & { value?: unknown }

/** A refusal with the texts of its code, unless better ones are at hand. */
export function refuse(code: RefusalCode, detail: RefusalDetail = {}): Refusal {
  const { reason = REFUSALS[code].reason, mend = REFUSALS[code].mend, pointer, column, line, value } = detail
  const refusal: Refusal = { code, reason: cutText(reason, TEXT_LENGTH), mend }
  if (pointer !== undefined) refusal.pointer = cutText(pointer, TEXT_LENGTH)
  if (column !== undefined) refusal.column = cutText(column, TEXT_LENGTH)
  if (line !== undefined) refusal.line = line
  if (value !== undefined) refusal.value = quoteValue(value)
  return refusal
}

export function failWhole(code: RefusalCode, detail: { reason?: string, mend?: string, place?: string | null } = {}): DecodeFailure {
  return { code, reason: cutText(detail.reason ?? REFUSALS[code].reason, TEXT_LENGTH), mend: detail.mend ?? REFUSALS[code].mend, place: detail.place ?? null }
}

/**
 * A refused value as text: strings as they are, everything else as JSON, cut to 200 characters.
 * NUL and halves of surrogate pairs become U+FFFD, since PostgreSQL can store neither.
 */
export function quoteValue(value: unknown): string {
  const text = typeof value === 'string' ? value : shortJson(value)
  return cutText(text, REFUSED_VALUE_LENGTH)
}

/** Text of at most `length` UTF-16 code units that PostgreSQL can store. */
export function cutText(text: string, length: number): string {
  return text.slice(0, length).replace(UNSTORABLE, '\uFFFD')
}

function shortJson(value: unknown): string {
  if (Array.isArray(value) && value.length > REFUSED_VALUE_LENGTH) return `list of ${value.length}`
  try {
    return JSON.stringify(value) ?? String(value)
  } catch {
    return Object.prototype.toString.call(value)
  }
}
