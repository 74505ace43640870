import { and, asc, eq, gte, inArray, lte } from 'drizzle-orm'
import type { ReadingDetail, RevisionSummary } from '#shared/api/readings'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import type { LimitSet } from '#shared/verdict/types'
import { explainRule, explainVerdict } from '#shared/verdict/words'
import { limitSets } from '../../database/schema/limits'
import { people } from '../../database/schema/organisations'
import { readingRevisions, readings } from '../../database/schema/readings'
import { submissions } from '../../database/schema/submissions'
import { withOrganisation, type Transaction } from '../../database/tenancy'
import { instantOfUuidV7 } from '../ids/uuid-v7'
import { decodeSubmission } from '../ingest/decode'
import { VISIT_MINUTES } from '../ingest/judge'
import { chunksOf } from '../ingest/submissions.queries'
import type { Scope } from './reading-filters'
import { selectReadings, type StoredReading } from './readings.queries'

/** Everything of one reading; null where there is none that the caller may see. */
export async function getReading(scope: Scope, id: string): Promise<ReadingDetail | null> {
  const sampledAt = instantOfUuidV7(id)
  if (!sampledAt) return null
  const { organisationId } = scope
  const found = await withOrganisation(organisationId, async (tx) => {
    const [reading] = await selectReadings(tx, [
      eq(readings.organisationId, organisationId), eq(readings.sampledAt, sampledAt), eq(readings.id, id),
      inArray(readings.shopId, scope.shopIds.length > 0 ? scope.shopIds : ['00000000-0000-0000-0000-000000000000']),
    ], 1)
    if (!reading) return null
    const { stored } = reading
    const [submission] = await tx.select().from(submissions).where(and(eq(submissions.organisationId, organisationId), eq(submissions.id, stored.submissionId)))
    const [limits] = await tx.select().from(limitSets).where(and(eq(limitSets.organisationId, organisationId), eq(limitSets.version, stored.limitSetVersion)))
    return { ...reading, submission: submission!, limits: limits!.content, revisions: await revisionsOf(tx, stored), samples: await samplesOfVisit(tx, stored) }
  })
  if (!found) return null
  const { row, stored, submission, limits, revisions, samples } = found
  const context = { declared: stored.declared, limits, resolution: stored.resolution }
  const declaredLimits = limits.limits[stored.declared] ?? limits.limits.default
  return {
    ...row,
    reported: stored.reported,
    composition: stored.composition,
    words: explainVerdict(stored.verdictDetail, context),
    rules: stored.verdictDetail.results.map(result => ({ ...result, words: explainRule(result, limits, stored.declared) })),
    verdictDetail: stored.verdictDetail,
    limitSet: { version: limits.version, name: limits.name, effectiveFrom: limits.effectiveFrom, decision: decisionWords(limits), guardFactor: limits.decision.kind === 'guarded' ? limits.decision.guardFactor : 0 },
    marks: {
      purityMinimum: declaredLimits.purityMinimum.value,
      foreignMaximum: declaredLimits.foreignMaximum.value,
      flammableMaximum: declaredLimits.flammableMaximum.value,
      unknownMaximum: declaredLimits.unknownMaximum.value,
      airCaution: declaredLimits.airCaution.value,
      airAction: declaredLimits.airAction.value,
    },
    conditions: { ambientCelsius: stored.ambientCelsius, pressureKilopascal: stored.pressureKilopascal, pressureKind: stored.pressureKind },
    operator: stored.operator,
    note: stored.note,
    extras: stored.extras ?? {},
    port: stored.port,
    senderReadingId: stored.senderReadingId,
    sequence: stored.sequence,
    submission: {
      id: submission.id, sha256: hex(submission.sha256), mediaType: submission.mediaType, receivedAt: submission.receivedAt.toISOString(),
      ordinal: stored.ordinal, line: stored.line,
    },
    digest: hex(stored.recordDigest),
    auditSequence: stored.auditSequence,
    raw: await rawRecord({ organisationId, id: submission.id, mediaType: submission.mediaType, contentEncoding: submission.contentEncoding }, stored.ordinal),
    revisions,
    samples,
  }
}

const hex = (bytes: Uint8Array): string => Buffer.from(bytes).toString('hex')

function decisionWords({ decision }: LimitSet): string {
  return decision.kind === 'simple'
    ? 'Simple acceptance: the measured value is held against the limit as it is.'
    : `Guarded acceptance: clear only where it lies inside the limit by ${decision.guardFactor} × U; in between, sample again.`
}

/** The record as the sender wrote it, found again in the bytes of its submission. */
async function rawRecord(submission: { organisationId: string, id: string, mediaType: string, contentEncoding: string | null }, ordinal: number): Promise<string> {
  const decoded = decodeSubmission({ mediaType: submission.mediaType, contentEncoding: submission.contentEncoding, chunks: chunksOf(submission) }, INTAKE_LIMITS)
  for await (const event of decoded) {
    if ('records' in event) {
      const record = event.records.find(record => record.ordinal === ordinal)
      if (record) return record.raw
    }
  }
  return ''
}

async function revisionsOf(tx: Transaction, stored: StoredReading): Promise<RevisionSummary[]> {
  const former = await tx.select({ revision: readingRevisions, name: people.name }).from(readingRevisions)
    .leftJoin(people, and(eq(people.organisationId, readingRevisions.organisationId), eq(people.id, readingRevisions.personId)))
    .where(and(eq(readingRevisions.organisationId, stored.organisationId), eq(readingRevisions.readingId, stored.id)))
    .orderBy(asc(readingRevisions.revision))
  const [reviser] = stored.revisedBy
    ? await tx.select({ name: people.name }).from(people).where(and(eq(people.organisationId, stored.organisationId), eq(people.id, stored.revisedBy)))
    : []
  return [
    ...former.map(({ revision, name }) => ({
      revision: revision.revision, at: revision.at.toISOString(), by: name ?? 'Intake', reason: revision.reason ?? 'As received', verdict: revision.verdict, limitSetVersion: revision.limitSetVersion,
    })),
    {
      revision: stored.revision, at: (stored.revisedAt ?? stored.receivedAt).toISOString(), by: reviser?.name ?? 'Intake', reason: stored.revisionReason ?? 'As received',
      verdict: stored.verdict, limitSetVersion: stored.limitSetVersion,
    },
  ]
}

async function samplesOfVisit(tx: Transaction, stored: StoredReading): Promise<ReadingDetail['samples']> {
  const window = 4 * VISIT_MINUTES * 60_000
  const rows = await tx.select({ id: readings.id, sampledAt: readings.sampledAt, verdict: readings.verdict, purityPercent: readings.purityPercent, declared: readings.declared })
    .from(readings)
    .where(and(
      eq(readings.organisationId, stored.organisationId), eq(readings.subjectId, stored.subjectId), eq(readings.shopId, stored.shopId),
      gte(readings.sampledAt, new Date(stored.sampledAt.getTime() - window)), lte(readings.sampledAt, new Date(stored.sampledAt.getTime() + window)),
    ))
    .orderBy(asc(readings.sampledAt), asc(readings.id)).limit(50)
  // A visit ends where the next sample is more than the window away.
  const own = rows.findIndex(row => row.id === stored.id)
  let from = own
  let to = own
  const near = (a: number, b: number) => rows[b]!.sampledAt.getTime() - rows[a]!.sampledAt.getTime() <= VISIT_MINUTES * 60_000
  while (from > 0 && near(from - 1, from)) from--
  while (to < rows.length - 1 && near(to, to + 1)) to++
  return rows.slice(from, to + 1).filter(row => row.id !== stored.id).map(({ id, sampledAt, verdict, purityPercent }) => ({ id, sampledAt: sampledAt.toISOString(), verdict, purityPercent }))
}
