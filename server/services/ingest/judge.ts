import { createHash } from 'node:crypto'
import { reportedJson } from '#shared/composition/composition-json'
import { normaliseComposition } from '#shared/composition/normalise'
import type { NormalisedComposition, ReportedComposition } from '#shared/composition/types'
import type { Flag } from '#shared/intake/kinds'
import type { PurityReading } from '#shared/intake/reading-schema'
import type { Substance } from '#shared/refrigerants/designations'
import { decideVerdict } from '#shared/verdict/decide'
import { verdictJson } from '#shared/verdict/verdict-json'
import type { EarlierSample, LimitSet, SampleValidity, Verdict } from '#shared/verdict/types'
import type { InstrumentRecord } from './organisation-context'

/** A record that is fit to become a reading. */
export interface Candidate {
  ordinal: number
  line: number | null
  reading: PurityReading
  extras: Record<string, string> | null
  /** SHA-256 of the reading in canonical form. */
  contentDigest: Buffer
  sampledAt: Date
  readingId: string
  composition: NormalisedComposition
  flags: Flag[]
}

/** An earlier sample of the same subject, with what tells whether it belongs to the same visit. */
export interface VisitSample extends EarlierSample {
  sampledAt: number
  workOrderId: string | null
  declared: string
}

/** Samples of one subject this close together are repeats of one another; common practice, no source. A service takes longer. */
export const VISIT_MINUTES = 45

/** The samples of the same visit before this one, oldest first. */
export function earlierInVisit(samples: VisitSample[], at: number, declared: string, workOrderId: string | null): VisitSample[] {
  const earlier: VisitSample[] = []
  let since = at
  for (let i = samples.length - 1; i >= 0; i--) {
    const sample = samples[i]!
    if (sample.sampledAt >= at || sample.declared !== declared) continue
    if (workOrderId && sample.workOrderId && workOrderId !== sample.workOrderId) continue
    if (since - sample.sampledAt > VISIT_MINUTES * 60_000) break
    earlier.unshift(sample)
    since = sample.sampledAt
  }
  return earlier
}

function validityOf(instrument: InstrumentRecord, reading: PurityReading, sampledAt: Date): SampleValidity {
  return {
    calibrationOverdue: instrument.calibrationDueAt !== null && sampledAt > instrument.calibrationDueAt,
    filterSpent: instrument.filterLifeSamples !== null && instrument.filterChangedAt !== null
      && sampledAt >= instrument.filterChangedAt && instrument.samplesOnFilter >= instrument.filterLifeSamples,
    ambientCelsius: reading.conditions?.ambientCelsius ?? null,
    ambientMinimumCelsius: instrument.ambientMinimumCelsius,
    ambientMaximumCelsius: instrument.ambientMaximumCelsius,
    instrumentOutOfControl: instrument.outOfControlSince !== null && sampledAt >= instrument.outOfControlSince,
  }
}

export interface Judged {
  verdict: Verdict
  flags: Flag[]
}

/** Applies the rules to one reading; what concerns the instrument is flagged too, so that it is seen in lists. */
export function judge(candidate: Pick<Candidate, 'reading' | 'composition' | 'sampledAt' | 'flags'>, instrument: InstrumentRecord, limits: LimitSet, earlier: EarlierSample[]): Judged {
  const { reading } = candidate
  const validity = validityOf(instrument, reading, candidate.sampledAt)
  const flags = [...candidate.flags]
  if (validity.calibrationOverdue) flags.push('calibration-overdue')
  if (validity.filterSpent) flags.push('filter-spent')
  const { ambientCelsius } = validity
  if (ambientCelsius !== null && (ambientCelsius < validity.ambientMinimumCelsius || ambientCelsius > validity.ambientMaximumCelsius)) flags.push('ambient-range')
  if (instrument.provisional) flags.push('unknown-instrument')
  const verdict = decideVerdict({
    declared: reading.declared,
    composition: candidate.composition,
    resolutionPercent: reading.composition.resolution,
    uncertainty: instrument.uncertainty,
    limits,
    validity,
    earlier,
  })
  return { verdict, flags }
}

/** Parts other than the declared refrigerant that were really seen, percent by mass air-free, largest first. */
export function contaminantsOf(composition: NormalisedComposition, declared: Substance): { substance: Substance, percent: number }[] {
  const found: { substance: Substance, percent: number }[] = []
  for (const part of composition.parts) {
    if (part.substance !== declared && !part.belowDetection && part.massFraction > 0) found.push({ substance: part.substance, percent: part.massFraction * 100 })
  }
  return found.length > 1 ? found.sort((a, b) => b.percent - a.percent) : found
}

export interface RecordDigestInput {
  readingId: string
  contentDigest: Uint8Array
  submissionId: string
  ordinal: number
  revision: number
  sampledAt: Date
  shopId: string
  subjectId: string
  instrumentId: string | null
  declared: string
  reported: ReportedComposition
  verdict: Verdict
}

/** The texts that are digested, and stored as they are. */
export interface RecordTexts { reported: string, verdict: string }

export function recordTexts({ reported, verdict }: Pick<RecordDigestInput, 'reported' | 'verdict'>): RecordTexts {
  return { reported: reportedJson(reported), verdict: verdictJson(verdict) }
}

/**
 * SHA-256 over what a reading claims, in canonical JSON (RFC 8785, members in order of their names): a
 * leaf of the audit event's Merkle tree. A changed column, composition or verdict no longer fits it.
 */
export function recordDigest(input: RecordDigestInput, texts: RecordTexts = recordTexts(input)): Buffer {
  const instrument = input.instrumentId === null ? 'null' : `"${input.instrumentId}"`
  const content = Buffer.from(input.contentDigest).toString('hex')
  return createHash('sha256').update(
    `{"content":"${content}","declared":"${input.declared}","instrument":${instrument},"ordinal":${input.ordinal},"reading":"${input.readingId}",`
    + `"reported":${texts.reported},"revision":${input.revision},"sampledAt":"${input.sampledAt.toISOString()}","shop":"${input.shopId}",`
    + `"subject":"${input.subjectId}","submission":"${input.submissionId}","verdict":${texts.verdict}}`,
  ).digest()
}

export function normalise(reading: PurityReading): NormalisedComposition {
  return normaliseComposition(reading.composition)
}
