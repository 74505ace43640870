import type { Refusal } from './refusal'

/** One record of a submission as a decoder found it, before it is held against the schema. */
export interface RawRecord {
  /** Place among the records of the submission, from 1; blank lines don't count. */
  ordinal: number
  /** Line where the record begins, from 1, blank lines counted; null in a JSON body. */
  line: number | null
  /** What was decoded; undefined where `refusals` says why it couldn't be. */
  value: unknown
  /** Source text of the record as sent; of a line that is too long, its beginning. What can't be stored (NUL, bytes that are no text) is U+FFFD in it. */
  raw: string
  /** Faults found while decoding; the record is then not held against the schema. */
  refusals?: Refusal[]
  /** Only CSV: the cells as sent, and the names of their columns, so that a refusal can tell what stood there. */
  cells?: { names: readonly string[], texts: readonly string[] }
  /** Only CSV: cells of columns that the schema doesn't know, by column name. Has no prototype. */
  extras?: Record<string, string>
  /** Tells how places are named back: JSON Pointer or column. */
  format: 'json' | 'csv'
}
