import type { SubmissionSource, SubmissionStatus } from '../intake/kinds'

export interface SubmissionRow {
  id: string
  status: SubmissionStatus
  source: SubmissionSource
  sender: string
  mediaType: string
  byteLength: number
  sha256: string
  receivedAt: string
  processedAt: string | null
  received: number
  accepted: number
  repeated: number
  refused: number
  /** Why the whole could not be read; null otherwise. */
  failure: { code: string, reason: string, place: string | null } | null
}

/** A record that was refused: where, what stood there, why, and how to mend it. */
export interface RefusedRow {
  ordinal: number
  /** Line as an editor counts it, from 1; null for JSON. */
  line: number | null
  column: string | null
  /** JSON Pointer within the record; null for CSV. */
  pointer: string | null
  /** As sent, cut to 200 characters. */
  value: string | null
  code: string
  reason: string
  mend: string
  senderReadingId: string | null
  /** For a conflict: the reading that holds the other content. */
  conflictingReadingId: string | null
}

export interface SubmissionDetail extends SubmissionRow {
  refusedRows: RefusedRow[]
  /** True where more were refused than are listed here. */
  refusedRowsCut: boolean
  extraColumns: string[]
  encoding: string | null
}

export interface SubmissionList {
  submissions: SubmissionRow[]
  nextCursor: string | null
}
