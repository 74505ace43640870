import { z } from 'zod'
import type { RefusedRow, SubmissionDetail } from '../api/intake'
import type { ReadingList, ReadingRow } from '../api/readings'
import { FLAGS, SUBJECT_KINDS, SUBMISSION_SOURCES, SUBMISSION_STATUSES } from '../intake/kinds'
import { REFUSALS } from '../intake/refusal'
import { DESIGNATIONS, SUBSTANCES } from '../refrigerants/designations'
import { RULES, VERDICTS } from '../verdict/types'

/*
 * The answers of the public calls, for the published document. The types of `shared/api` are what the
 * server and the screens use; each schema here must fit its type, or this file doesn't compile.
 * Members may be added to an answer, so that a program must pass over what it doesn't know.
 */

const moment = z.string().meta({ format: 'date-time' })
const count = z.int().min(0)

export const refusedRowAnswer: z.ZodType<RefusedRow> = z.looseObject({
  ordinal: z.int().min(1).describe('Place of the record in the submission, from 1.'),
  line: z.int().nullable().describe('Line as an editor counts it, from 1; null for JSON.'),
  column: z.string().nullable().describe('CSV column.'),
  pointer: z.string().nullable().describe('JSON Pointer within the record; null for CSV.'),
  value: z.string().max(200).nullable().describe('What stood there, cut to 200 characters.'),
  code: z.string().describe(`One of: ${Object.keys(REFUSALS).join(', ')}.`),
  reason: z.string(),
  mend: z.string().describe('How to mend it.'),
  senderReadingId: z.string().nullable(),
  conflictingReadingId: z.string().nullable().describe('For a conflict: the reading that holds the other content.'),
})

const failure = z.looseObject({ code: z.string(), reason: z.string(), place: z.string().nullable() }).nullable().describe('Why the whole could not be read; null otherwise.')

export const submissionAnswer: z.ZodType<SubmissionDetail> = z.looseObject({
  id: z.string(),
  status: z.enum(SUBMISSION_STATUSES),
  source: z.enum(SUBMISSION_SOURCES),
  sender: z.string(),
  mediaType: z.string(),
  byteLength: count,
  sha256: z.string().describe('SHA-256 of the bytes as received, in hexadecimal.'),
  receivedAt: moment,
  processedAt: moment.nullable(),
  received: count,
  accepted: count,
  repeated: count.describe('Records that had come before with the same content.'),
  refused: count,
  failure,
  refusedRows: z.array(refusedRowAnswer),
  refusedRowsCut: z.boolean().describe('True where more were refused than are listed.'),
  extraColumns: z.array(z.string()),
  encoding: z.string().nullable(),
})

export const receiptAnswer = z.looseObject({
  submission: z.looseObject({ id: z.string(), status: z.enum(SUBMISSION_STATUSES), received: count, accepted: count, refused: count }),
})

export const waitedAnswer = z.looseObject({
  submission: z.looseObject({ id: z.string(), status: z.enum(SUBMISSION_STATUSES), received: count, accepted: count, repeated: count, refused: count, failure }),
  readings: z.array(z.looseObject({
    id: z.string(),
    senderId: z.string().describe('The sender\'s own id.'),
    verdict: z.enum(VERDICTS),
    tag: z.string().describe('Name of the verdict.'),
    nextStep: z.string().describe('What to do next, in one sentence.'),
    reason: z.string(),
    cautions: z.array(z.string()).describe('Cautions that must be shown with the verdict.'),
  })).describe('At most 100; the rest is found through the submission.'),
  refused: z.array(refusedRowAnswer),
})

export const submissionDetailAnswer = z.looseObject({ submission: submissionAnswer })

const readingRowShape = {
  id: z.string(),
  sampledAt: moment,
  receivedAt: moment,
  shop: z.looseObject({ id: z.string(), name: z.string(), timeZone: z.string() }),
  instrument: z.looseObject({ id: z.string(), serial: z.string() }).nullable(),
  subject: z.looseObject({ kind: z.enum(SUBJECT_KINDS), id: z.string(), label: z.string(), vin: z.string().nullable(), plate: z.string().nullable(), workOrder: z.string().nullable() }),
  declared: z.enum(DESIGNATIONS),
  verdict: z.enum(VERDICTS),
  decidedBy: z.enum(RULES),
  decidedBySubstance: z.enum(SUBSTANCES).nullable(),
  purityPercent: z.number().describe('Declared refrigerant, air-free, percent by mass.'),
  purityUncertainty: z.number().nullable().describe('Its expanded uncertainty (k = 2).'),
  contaminants: z.array(z.looseObject({ substance: z.enum(SUBSTANCES), percent: z.number() })),
  airPercent: z.number().nullable().describe('Percent by mass of the sample; null: not measured.'),
  resolution: z.number(),
  attempt: z.int().min(1),
  flags: z.array(z.enum(FLAGS)),
  batch: z.string().nullable(),
  source: z.enum(SUBMISSION_SOURCES),
  revision: z.int().min(1),
}

export const readingRowAnswer: z.ZodType<ReadingRow> = z.looseObject(readingRowShape)

export const readingListAnswer: z.ZodType<ReadingList> = z.looseObject({
  readings: z.array(readingRowAnswer),
  nextCursor: z.string().nullable().describe('For the next page; null on the last.'),
})

export const readingDetailAnswer = z.looseObject({
  ...readingRowShape,
  reported: z.looseObject({}).describe('The composition as it was sent.'),
  composition: z.looseObject({}).describe('The refrigerants air-free, by mass and by mole, and air as a share of the whole.'),
  rules: z.array(z.looseObject({})).describe('Every rule with its numbers and words.'),
  limitSet: z.looseObject({ version: z.number(), name: z.string() }).describe('The limits that were in force.'),
  revisions: z.array(z.looseObject({ revision: z.number(), at: moment, by: z.string(), reason: z.string() })),
  digest: z.string().describe('SHA-256 of the record in canonical form.'),
  raw: z.string().describe('The record as it was sent.'),
})

export const healthAnswer = z.looseObject({ status: z.literal('ok') })
export const readyAnswer = z.looseObject({ status: z.enum(['ok', 'not ready']), checks: z.unknown() })

export const problemAnswer = z.looseObject({
  type: z.string().describe('Address of the explanation.'),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  requestId: z.string().optional(),
  retryable: z.boolean().describe('Whether the same request may succeed later.'),
  errors: z.array(z.looseObject({
    pointer: z.string().optional(),
    parameter: z.string().optional(),
    place: z.string().nullable().optional(),
    code: z.string(),
    detail: z.string().optional(),
  })).optional(),
}).describe('RFC 9457 problem details.')

