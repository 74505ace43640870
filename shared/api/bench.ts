import type { ReadingRow } from './readings'
import type { SubmissionRow } from './intake'
import type { VerdictKind } from '../verdict/types'

/** Today's work in the shops that the person may see. */
export interface BenchView {
  /** Start of today in the shop's zone. */
  dayStart: string
  /** Readings sampled today by verdict. */
  counts: Record<VerdictKind, number>
  /** The latest readings, newest first, at most 30. */
  latest: ReadingRow[]
  /** Isolate and flammable verdicts of the last seven days that nobody has followed with a clean sample, newest first. */
  alarms: ReadingRow[]
  /** Verdicts "sample again" of the last 24 hours still waiting for another sample. */
  again: ReadingRow[]
  /** Submissions still waiting or with something refused, newest first, at most 10. */
  waiting: SubmissionRow[]
}
