import { createHash } from 'node:crypto'
import { canonicalReading } from '#shared/intake/canonical-reading'
import { checkRecord, placeRefusal, senderIdOf } from '#shared/intake/check-record'
import { flagsFor } from '#shared/intake/flags'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import type { RawRecord } from '#shared/intake/raw-record'
import { refuse, type DecodeFailure, type Refusal } from '#shared/intake/refusal'
import type { SubmissionFailure } from '../../database/schema/submissions'
import { withOrganisationBulk } from '../../database/tenancy'
import { uuidV7 } from '../ids/uuid-v7'
import { commitChunk, type Chunk } from './commit-chunk'
import { decodeSubmission } from './decode'
import { Fenced } from './ingest.errors'
import { normalise, type Candidate } from './judge'
import { chunksOf, failSubmission, takeUp, type OpenSubmission } from './submissions.queries'

/** Sampling times before the instruments existed or years ahead are slips of a clock that was never set. */
const EARLIEST = Date.UTC(2000, 0, 1)
const AHEAD_YEARS = 10

/**
 * Turns one submission into readings and refused rows: decode, validate, normalise, match, judge, write,
 * a transaction a chunk. May be killed and repeated at any moment: settled records are passed over, and
 * a run that was overtaken can't write any more.
 */
export async function processSubmission({ organisationId, submissionId }: { organisationId: string, submissionId: string }): Promise<void> {
  const submission = await withOrganisationBulk(organisationId, tx => takeUp(tx, organisationId, submissionId))
  if (!submission) return
  try {
    await run(submission)
  } catch (error) {
    if (!(error instanceof Fenced)) throw error
  }
}

type PreparedChunk = Omit<Chunk, 'last'>

/** From this size on, a fault of the whole (too many rows, cut gzip) may show only after chunks were committed. */
const READ_THROUGH_BYTES = 4 * 1024 * 1024

const decode = (submission: OpenSubmission) => decodeSubmission({
  mediaType: submission.mediaType,
  contentEncoding: submission.contentEncoding,
  chunks: chunksOf(submission),
}, INTAKE_LIMITS)

async function run(submission: OpenSubmission): Promise<void> {
  const report = { encoding: null as string | null, delimiter: null as string | null, extraColumns: [] as string[] }
  const large = submission.byteLength > READ_THROUGH_BYTES || submission.contentEncoding !== null
  const fault = submission.nextOrdinal === 1 && large ? await faultOfWhole(submission) : null
  if (fault) return failSubmission(submission, fault, report)
  const decoded = decode(submission)

  let previous: PreparedChunk | null = null
  let committing: Promise<void> = Promise.resolve()
  // The next chunk is decoded while the last one is being written: two processes, two cores.
  for await (const event of decoded) {
    if ('failure' in event) {
      await committing
      if (previous) await commitChunk(submission, { ...previous, last: null })
      await failSubmission(submission, told(event.failure), report)
      return
    }
    if ('report' in event) {
      Object.assign(report, event.report)
      continue
    }
    const records = event.records.filter(record => record.ordinal >= submission.nextOrdinal)
    if (records.length === 0) continue
    const prepared = prepare(submission, records)
    await committing
    const ready = previous
    previous = prepared
    if (ready) {
      committing = commitChunk(submission, { ...ready, last: null })
      // A failure is met at the next await; until then it must not count as unhandled.
      committing.catch(() => {})
    }
  }
  await committing
  await commitChunk(submission, { ...(previous ?? { firstOrdinal: submission.nextOrdinal, nextOrdinal: submission.nextOrdinal, candidates: [], refused: [], received: 0 }), last: report })
}

const told = ({ code, reason, mend, place }: DecodeFailure): SubmissionFailure => ({ code, reason: `${reason} ${mend}`, place })

/** Reads a large delivery through before anything of it is kept: what can't be read as a whole leaves no half behind. */
async function faultOfWhole(submission: OpenSubmission): Promise<SubmissionFailure | null> {
  for await (const event of decode(submission)) if ('failure' in event) return told(event.failure)
  return null
}

/** The part of the work that needs no database: validate, digest, normalise. */
function prepare(submission: OpenSubmission, records: RawRecord[]): PreparedChunk {
  const candidates: Candidate[] = []
  const refused: PreparedChunk['refused'] = []
  for (const record of records) {
    const outcome = examine(submission, record)
    if ('refusals' in outcome) refused.push({ ordinal: record.ordinal, line: record.line, senderReadingId: outcome.senderReadingId, refusals: outcome.refusals, conflictingReadingId: null })
    else candidates.push(outcome)
  }
  return { firstOrdinal: records[0]!.ordinal, nextOrdinal: records.at(-1)!.ordinal + 1, candidates, refused, received: records.length }
}

function examine(submission: OpenSubmission, record: RawRecord): Candidate | { refusals: Refusal[], senderReadingId: string | null } {
  const check = checkRecord(record)
  if (!check.ok) return { refusals: check.refusals, senderReadingId: senderIdOf(record) }
  const { reading } = check
  const sampledAt = new Date(reading.sampledAt)
  const wrong = wrongClock(sampledAt, submission) ?? wrongInstrument(reading.instrument.serial, submission)
  if (wrong) return { refusals: [placeRefusal(record, wrong)], senderReadingId: reading.id }
  const composition = normalise(reading)
  return {
    ordinal: record.ordinal,
    line: record.line,
    reading,
    extras: record.extras ?? null,
    contentDigest: createHash('sha256').update(canonicalReading(reading)).digest(),
    sampledAt,
    readingId: uuidV7(sampledAt.getTime()),
    composition,
    flags: flagsFor({ reading, sum: composition.sum, receivedAt: submission.receivedAt }),
  }
}

function wrongClock(sampledAt: Date, submission: OpenSubmission): Refusal | null {
  const at = sampledAt.getTime()
  if (at >= EARLIEST && at <= submission.receivedAt.getTime() + AHEAD_YEARS * 366 * 86_400_000) return null
  return refuse('time', { pointer: '/sampledAt', value: sampledAt.toISOString(), reason: `The time lies before 2000 or more than ${AHEAD_YEARS} years ahead.`, mend: 'Set the clock of the device and send the reading with its right time.' })
}

/** A device's token speaks for one instrument; a file may bring readings of several. */
function wrongInstrument(serial: string, submission: OpenSubmission): Refusal | null {
  if (submission.instrumentSerial === null || submission.instrumentSerial === serial) return null
  return refuse('instrument', { pointer: '/instrument/serial', value: serial })
}
