import { z } from 'zod'
import type { NormalisedComposition, ReportedComposition } from '../composition/types'
import { DESIGNATIONS, type Designation, type Substance } from '../refrigerants/designations'
import { SUBJECT_KINDS, type Flag, type SubjectKind, type SubmissionSource } from '../intake/kinds'
import { VERDICTS, type RuleResult, type RuleWords, type Verdict, type VerdictKind, type VerdictWords } from '../verdict/types'

/** Filters of the results browser; the same names stand in the page's address and in the API's query. */
export const readingFilters = z.object({
  verdict: z.array(z.enum(VERDICTS)).optional(),
  declared: z.array(z.enum(DESIGNATIONS)).optional(),
  /** Days in the shop's zone, both included, `YYYY-MM-DD`. */
  from: z.iso.date().optional(),
  to: z.iso.date().optional(),
  shop: z.array(z.uuid()).optional(),
  instrument: z.array(z.uuid()).optional(),
  subject: z.array(z.enum(SUBJECT_KINDS)).optional(),
  batch: z.string().min(1).max(200).optional(),
  /** Looks in VIN, plate, work order, cylinder tag, lot, note: literal text. */
  text: z.string().min(1).max(200).optional(),
  submission: z.uuid().optional(),
})
export type ReadingFilters = z.infer<typeof readingFilters>

export const readingListQuery = readingFilters.extend({
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
})
export type ReadingListQuery = z.infer<typeof readingListQuery>

export interface SubjectSummary {
  kind: SubjectKind
  id: string
  /** What people call it: plate, VIN, cylinder tag, lot number or check standard. */
  label: string
  vin: string | null
  plate: string | null
  workOrder: string | null
}

/** A row of the results browser. */
export interface ReadingRow {
  id: string
  sampledAt: string
  receivedAt: string
  shop: { id: string, name: string, timeZone: string }
  instrument: { id: string, serial: string } | null
  subject: SubjectSummary
  declared: Designation
  verdict: VerdictKind
  decidedBy: RuleResult['rule']
  decidedBySubstance: Substance | null
  /** Declared refrigerant, air-free, percent by mass. */
  purityPercent: number
  /** Expanded uncertainty of it. */
  purityUncertainty: number | null
  /** Every part that is not the declared refrigerant and not below detection, percent by mass air-free, largest first. */
  contaminants: { substance: Substance, percent: number }[]
  /** Percent by mass of the sample; null where not measured. */
  airPercent: number | null
  resolution: number
  attempt: number
  flags: Flag[]
  batch: string | null
  source: SubmissionSource
  revision: number
}

export interface ReadingList {
  readings: ReadingRow[]
  /** For the next page; null on the last. */
  nextCursor: string | null
}

export interface RevisionSummary {
  revision: number
  at: string
  by: string
  reason: string
  verdict: VerdictKind
  limitSetVersion: number
}

/** Everything of one reading. */
export interface ReadingDetail extends ReadingRow {
  reported: ReportedComposition
  composition: NormalisedComposition
  words: VerdictWords
  rules: (RuleResult & { words: RuleWords })[]
  verdictDetail: Verdict
  limitSet: { version: number, name: string, effectiveFrom: string, decision: string, guardFactor: number }
  /** Limits that the strip's lens draws, percent by mass air-free (air: of the sample). */
  marks: { purityMinimum: number, foreignMaximum: number, flammableMaximum: number, unknownMaximum: number, airCaution: number, airAction: number }
  conditions: { ambientCelsius: number | null, pressureKilopascal: number | null, pressureKind: 'gauge' | 'absolute' | null }
  operator: string | null
  note: string
  extras: Record<string, string>
  port: 'low' | 'high' | null
  senderReadingId: string
  sequence: number | null
  submission: { id: string, sha256: string, mediaType: string, receivedAt: string, ordinal: number, line: number | null }
  /** SHA-256 of the record in canonical form, and its place in the organisation's audit chain. */
  digest: string
  auditSequence: number
  /** The record as the sender wrote it. */
  raw: string
  revisions: RevisionSummary[]
  /** Other samples of the same subject in the same visit, oldest first. */
  samples: { id: string, sampledAt: string, verdict: VerdictKind, purityPercent: number }[]
}
