import { createHash } from 'node:crypto'
import { merkleRoot } from '#shared/audit/merkle'
import { compositionJson } from '#shared/composition/composition-json'
import type { Flag } from '#shared/intake/kinds'
import { refuse, type Refusal } from '#shared/intake/refusal'
import type { Verdict } from '#shared/verdict/types'
import type { SubmissionReport } from '../../database/schema/submissions'
import { withOrganisationBulk, withoutOrganisation, type BulkTransaction } from '../../database/tenancy'
import { NEWS_CHANNEL } from '../../database/queue/definitions'
import { appendAuditEvent, lockAuditHead } from '../audit/append-event'
import { Fenced } from './ingest.errors'
import { copyReadings, type CopyValue } from './copy-readings'
import { contaminantsOf, earlierInVisit, judge, recordDigest, recordTexts, type Candidate, type RecordTexts, type VisitSample } from './judge'
import { matchSubjects, type MatchedSubject } from './match-subjects'
import { instrumentsBySerial, limitSetVersions, limitsInForce, type InstrumentRecord } from './organisation-context'
import { addToRollups, type RollupEntry } from './rollups'
import { LEASE_SECONDS, type OpenSubmission } from './submissions.queries'

export interface RefusedRecord {
  ordinal: number
  line: number | null
  senderReadingId: string | null
  refusals: Refusal[]
  conflictingReadingId: string | null
}

export interface Chunk {
  firstOrdinal: number
  nextOrdinal: number
  received: number
  candidates: Candidate[]
  refused: RefusedRecord[]
  /** The report of the whole where this is the last chunk; null where more follow. */
  last: SubmissionReport | null
}

interface Placed extends Candidate {
  subject: MatchedSubject
  instrument: InstrumentRecord
  verdict: Verdict
  flags: Flag[]
  texts: RecordTexts
  digest: Buffer
}

const sha256 = (bytes: Uint8Array): Uint8Array => createHash('sha256').update(bytes).digest()

/**
 * Writes one chunk in one transaction: identities, subjects, readings, refused rows, rollups, the audit
 * event, the submission's progress and the news of it. All of it, or none.
 *
 * @throws Fenced where another worker has taken the submission up.
 */
export async function commitChunk(submission: OpenSubmission, chunk: Chunk): Promise<void> {
  await ensurePartitions(chunk.candidates)
  await withOrganisationBulk(submission.organisationId, async (tx) => {
    await claimProgress(tx, submission, chunk)
    const { fresh, repeated, conflicts } = await claimIdentities(tx, submission, chunk.candidates)
    const refused = [...chunk.refused, ...conflicts].sort((a, b) => a.ordinal - b.ordinal)
    const placed = await placeAndJudge(tx, submission, fresh)
    if (refused.length > 0) await writeRefused(tx, submission, refused)
    if (placed.length > 0) await addToRollups(tx, submission, placed.map(rollupEntry))
    await writeReadings(tx, submission, chunk, placed, { repeated, refused: refused.length })
    await recordProgress(tx, submission, chunk, { accepted: placed.length, repeated, refused: refused.length })
    await tx`select pg_notify(${NEWS_CHANNEL}, ${JSON.stringify({
      organisationId: submission.organisationId, submissionId: submission.id, count: placed.length,
      readingIds: placed.slice(-50).map(reading => reading.readingId), settled: chunk.last !== null,
    })})`
  })
  submission.nextOrdinal = chunk.nextOrdinal
}

const knownPartitions = new Set<string>()

/** Months that were never met get their partition before the transaction: making one waits for the readers of the table. */
async function ensurePartitions(candidates: Candidate[]): Promise<void> {
  const months = new Set<string>()
  for (const { sampledAt } of candidates) months.add(sampledAt.toISOString().slice(0, 7))
  for (const month of months) {
    if (knownPartitions.has(month)) continue
    await withoutOrganisation(client => client`select ensure_reading_partition(${`${month}-01`}::date)`)
    knownPartitions.add(month)
  }
}

/** The row's lock is held to the end: two workers can't write the same chunk, and an overtaken one stops here. */
async function claimProgress(tx: BulkTransaction, { organisationId, id, attempt }: OpenSubmission, { firstOrdinal }: Chunk): Promise<void> {
  const rows = await tx`
    select 1 from submissions where organisation_id = ${organisationId} and id = ${id} and attempt = ${attempt}
      and status = 'processing' and next_ordinal <= ${firstOrdinal} for update`
  if (rows.length === 0) throw new Fenced()
}

/** The sender's ids decide what is new: the constraint, not a look beforehand. */
async function claimIdentities(tx: BulkTransaction, { organisationId, id, sender }: OpenSubmission, candidates: Candidate[]) {
  const first = new Map<string, Candidate>()
  const later: Candidate[] = []
  for (const candidate of candidates) {
    if (first.has(candidate.reading.id)) later.push(candidate)
    else first.set(candidate.reading.id, candidate)
  }
  const unique = [...first.values()]
  if (unique.length === 0) return { fresh: [], repeated: 0, conflicts: [] as RefusedRecord[] }
  const inserted = await tx<{ id: string }[]>`
    insert into reading_identities (organisation_id, sender, sender_reading_id, reading_id, sampled_at, submission_id, content_digest)
    select ${organisationId}, ${sender}, given.sender_reading_id, given.reading_id, given.sampled_at, ${id}, decode(given.digest, 'hex')
    from unnest(${unique.map(c => c.reading.id)}::text[], ${unique.map(c => c.readingId)}::uuid[], ${unique.map(c => c.sampledAt.toISOString())}::timestamptz[],
      ${unique.map(c => c.contentDigest.toString('hex'))}::text[]) as given(sender_reading_id, reading_id, sampled_at, digest)
    on conflict do nothing returning sender_reading_id as id`
  const mine = new Set(inserted.map(row => row.id))
  const fresh = unique.filter(candidate => mine.has(candidate.reading.id))
  const doubtful = [...unique.filter(candidate => !mine.has(candidate.reading.id)), ...later]
  if (doubtful.length === 0) return { fresh, repeated: 0, conflicts: [] as RefusedRecord[] }
  const held = await tx<{ sender_reading_id: string, reading_id: string, content_digest: Uint8Array }[]>`
    select i.sender_reading_id, i.reading_id, i.content_digest from unnest(${doubtful.map(c => c.reading.id)}::text[]) as wanted(id)
    join reading_identities i on i.organisation_id = ${organisationId} and i.sender = ${sender} and i.sender_reading_id = wanted.id`
  const holders = new Map(held.map(row => [row.sender_reading_id, row]))
  const conflicts: RefusedRecord[] = []
  for (const candidate of doubtful) {
    const holder = holders.get(candidate.reading.id)!
    if (candidate.contentDigest.equals(holder.content_digest)) continue
    const firstLine = first.get(candidate.reading.id) !== candidate ? first.get(candidate.reading.id)!.line : null
    conflicts.push({
      ordinal: candidate.ordinal, line: candidate.line, senderReadingId: candidate.reading.id, conflictingReadingId: holder.reading_id,
      refusals: [refuse('conflict', {
        pointer: '/id', value: candidate.reading.id, ...(candidate.line === null ? {} : { line: candidate.line, column: 'id' }),
        ...(firstLine === null ? {} : { reason: `The same id stands on line ${firstLine} with other content.` }),
      })],
    })
  }
  return { fresh, repeated: doubtful.length - conflicts.length, conflicts }
}

async function placeAndJudge(tx: BulkTransaction, submission: OpenSubmission, fresh: Candidate[]): Promise<Placed[]> {
  if (fresh.length === 0) return []
  const { organisationId, shopId } = submission
  const subjects = await matchSubjects(tx, organisationId, shopId, fresh.map(candidate => candidate.reading))
  const instruments = await instrumentsBySerial(tx, organisationId, shopId, fresh.map(candidate => candidate.reading.instrument.serial))
  const versions = await limitSetVersions(tx, organisationId)
  const visits = await visitSamples(tx, organisationId, fresh, subjects)

  const order = fresh.map((_, i) => i).sort((a, b) => fresh[a]!.sampledAt.getTime() - fresh[b]!.sampledAt.getTime() || a - b)
  const placed = new Array<Placed>(fresh.length)
  for (const i of order) {
    const candidate = fresh[i]!
    const subject = subjects[i]!
    const { reading } = candidate
    const instrument = instruments.get(reading.instrument.serial)!
    const at = candidate.sampledAt.getTime()
    // A check standard is measured again and again by design; its samples are no attempts at one verdict.
    const samples = reading.subject.kind === 'check' ? undefined : visits.get(subject.subjectId)
    const earlier = samples ? earlierInVisit(samples, at, reading.declared, subject.workOrderId) : []
    const { verdict, flags } = judge(candidate, instrument, limitsInForce(versions, candidate.sampledAt), earlier)
    const texts = recordTexts({ reported: reading.composition, verdict })
    const digest = recordDigest({
      readingId: candidate.readingId, contentDigest: candidate.contentDigest, submissionId: submission.id, ordinal: candidate.ordinal, revision: 1,
      sampledAt: candidate.sampledAt, shopId, subjectId: subject.subjectId, instrumentId: instrument.id, declared: reading.declared, reported: reading.composition, verdict,
    }, texts)
    placed[i] = Object.assign(candidate, { subject, instrument, verdict, flags, texts, digest })
    if (reading.subject.kind !== 'check') {
      const sample: VisitSample = { composition: candidate.composition, resolutionPercent: reading.composition.resolution, sampledAt: at, workOrderId: subject.workOrderId, declared: reading.declared }
      const list = samples ?? []
      list.push(sample)
      list.sort((a, b) => a.sampledAt - b.sampledAt)
      if (!samples) visits.set(subject.subjectId, list)
    }
  }
  return placed
}

/** Samples already recorded around the times of the new ones, by subject, oldest first. */
async function visitSamples(tx: BulkTransaction, organisationId: string, fresh: Candidate[], subjects: MatchedSubject[]): Promise<Map<string, VisitSample[]>> {
  const ids = new Set<string>()
  let from = Infinity
  let to = -Infinity
  fresh.forEach(({ reading, sampledAt }, i) => {
    if (reading.subject.kind === 'check') return
    ids.add(subjects[i]!.subjectId)
    from = Math.min(from, sampledAt.getTime())
    to = Math.max(to, sampledAt.getTime())
  })
  const visits = new Map<string, VisitSample[]>()
  if (ids.size === 0) return visits
  const rows = await tx<{ subject_id: string, sampled_at: Date, declared: string, work_order_id: string | null, composition: VisitSample['composition'], resolution: number }[]>`
    select r.subject_id, r.sampled_at, r.declared, r.work_order_id, r.composition, r.resolution
    from unnest(${[...ids]}::uuid[]) as wanted(id) join readings r on r.organisation_id = ${organisationId} and r.subject_id = wanted.id
    where r.sampled_at >= ${new Date(from - 6 * 3_600_000).toISOString()} and r.sampled_at <= ${new Date(to).toISOString()}
    order by r.sampled_at, r.id`
  for (const row of rows) {
    const sample = { composition: row.composition, resolutionPercent: row.resolution, sampledAt: row.sampled_at.getTime(), workOrderId: row.work_order_id, declared: row.declared }
    const list = visits.get(row.subject_id)
    if (list) list.push(sample)
    else visits.set(row.subject_id, [sample])
  }
  return visits
}

function rollupEntry({ reading, sampledAt, instrument, verdict, composition }: Placed): RollupEntry {
  return {
    sampledAt, declared: reading.declared, subjectKind: reading.subject.kind, instrumentId: instrument.id, verdict: verdict.kind,
    purityPercent: verdict.purityPercent, airPercent: composition.air ? composition.air.massFraction * 100 : null,
  }
}

function rowOf(submission: OpenSubmission, placed: Placed, auditSequence: number): CopyValue[] {
  const { reading, verdict, composition, subject } = placed
  const purity = verdict.results.find(result => result.rule === 'purity')
  const port = reading.subject.kind === 'vehicle' ? reading.subject.port ?? null : null
  return [
    submission.organisationId, placed.sampledAt.toISOString(), placed.readingId, submission.shopId, placed.instrument.id, reading.instrument.sequence ?? null,
    reading.subject.kind, subject.subjectId, subject.workOrderId,
    reading.declared, verdict.kind, verdict.decidedBy, verdict.decidedBySubstance ?? null, verdict.purityPercent, purity?.uncertainty ?? null,
    composition.air ? composition.air.massFraction * 100 : null,
    JSON.stringify(contaminantsOf(composition, reading.declared)), reading.composition.resolution, placed.texts.reported, compositionJson(composition), placed.texts.verdict,
    verdict.limitSetVersion, verdict.attempt, placed.flags, reading.batch ?? null,
    reading.operator ?? null, reading.note ?? '', reading.conditions?.ambientCelsius ?? null, reading.conditions?.pressureKilopascal ?? null,
    reading.conditions?.pressureKind ?? null, port, placed.extras ? JSON.stringify(placed.extras) : null, submission.source, submission.id,
    placed.ordinal, placed.line, submission.sender, reading.id, submission.receivedAt.toISOString(), placed.digest, auditSequence,
  ]
}

/** The chain is held from here to the commit, so everything that could be done before is done. */
async function writeReadings(tx: BulkTransaction, submission: OpenSubmission, chunk: Chunk, placed: Placed[], counts: { repeated: number, refused: number }): Promise<void> {
  const head = await lockAuditHead(tx, submission.organisationId)
  const auditSequence = head.sequence + 1
  const root = merkleRoot(placed.map(reading => reading.digest), sha256)
  await appendAuditEvent(tx, {
    organisationId: submission.organisationId, at: new Date(), actor: submission.actor,
    action: chunk.last ? 'submission.processed' : 'submission.chunk', entityKind: 'submission', entityId: submission.id,
    detail: {
      sha256: Buffer.from(submission.sha256).toString('hex'), fromOrdinal: chunk.firstOrdinal, toOrdinal: chunk.nextOrdinal - 1,
      readings: placed.length, root: Buffer.from(root).toString('hex'), ...counts,
    },
  }, head)
  if (placed.length > 0) await copyReadings(tx, placed.map(reading => rowOf(submission, reading, auditSequence)))
}

async function writeRefused(tx: BulkTransaction, { organisationId, id }: OpenSubmission, refused: RefusedRecord[]): Promise<void> {
  const rows = refused.flatMap(record => record.refusals.map((refusal, i) => ({
    organisation_id: organisationId, submission_id: id, ordinal: record.ordinal, reason_ordinal: i, line: refusal.line ?? record.line,
    column: refusal.column ?? null, pointer: refusal.pointer ?? null, value: refusal.value ?? null, code: refusal.code, reason: refusal.reason, mend: refusal.mend,
    sender_reading_id: record.senderReadingId, conflicting_reading_id: record.conflictingReadingId,
  })))
  for (let at = 0; at < rows.length; at += 4000) await tx`insert into refused_rows ${tx(rows.slice(at, at + 4000))}`
}

async function recordProgress(tx: BulkTransaction, submission: OpenSubmission, chunk: Chunk, counts: { accepted: number, repeated: number, refused: number }): Promise<void> {
  const settled = chunk.last !== null
  await tx`
    update submissions set next_ordinal = ${chunk.nextOrdinal},
      received_count = received_count + ${chunk.received}, accepted_count = accepted_count + ${counts.accepted},
      repeated_count = repeated_count + ${counts.repeated}, refused_count = refused_count + ${counts.refused},
      status = ${settled ? 'done' : 'processing'}, processed_at = ${settled ? new Date().toISOString() : null},
      lease_until = ${settled ? null : new Date(Date.now() + LEASE_SECONDS * 1000).toISOString()},
      report = ${chunk.last ? tx.json(chunk.last as never) : null}
    where organisation_id = ${submission.organisationId} and id = ${submission.id}`
}
