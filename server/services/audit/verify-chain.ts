import { createHash } from 'node:crypto'
import { merkleRoot } from '#shared/audit/merkle'
import type { ReportedComposition } from '#shared/composition/types'
import type { Verdict } from '#shared/verdict/types'
import { withOrganisationBulk, type BulkTransaction } from '../../database/tenancy'
import { recordDigest } from '../ingest/judge'
import { chainDigest, EMPTY_CHAIN } from './append-event'

export interface ChainReport {
  events: number
  readings: number
  /** Empty where everything holds; otherwise what does not, in order, at most 100. */
  faults: string[]
}

interface EventRow { sequence: string, at: Date, actor: string, action: string, entity_kind: string, entity_id: string, detail: Record<string, unknown>, previous_digest: Uint8Array, digest: Uint8Array }
interface LeafRow {
  audit_sequence: string, ordinal: number, id: string, record_digest: Uint8Array, submission_id: string, revision: number, sampled_at: Date, shop_id: string
  subject_id: string, instrument_id: string | null, declared: string, verdict: string, purity_percent: number, reported: ReportedComposition, verdict_detail: Verdict
  content_digest: Uint8Array | null
}

const MOST_FAULTS = 100

/**
 * Recomputes an organisation's whole chain: each event's digest, that they follow one another without a
 * gap to the recorded end, and each event's Merkle root over the readings that it wrote, whose digests
 * are made again from the rows as they stand.
 */
export async function verifyChain(organisationId: string): Promise<ChainReport> {
  return withOrganisationBulk(organisationId, async (tx) => {
    const faults: string[] = []
    const fault = (text: string) => {
      if (faults.length < MOST_FAULTS) faults.push(text)
    }
    const { leaves, readings } = await leavesByEvent(tx, organisationId, fault)
    let events = 0
    let previous: Uint8Array = EMPTY_CHAIN
    const cursor = tx<EventRow[]>`select * from audit_events where organisation_id = ${organisationId} order by sequence`.cursor(1000)
    for await (const rows of cursor) {
      for (const row of rows) {
        events++
        const sequence = Number(row.sequence)
        if (sequence !== events) fault(`Event ${events} is missing: ${sequence} follows.`)
        const made = chainDigest(previous, { organisationId, sequence, at: row.at, actor: row.actor, action: row.action, entityKind: row.entity_kind, entityId: row.entity_id, detail: row.detail })
        if (!made.equals(row.digest)) fault(`Event ${sequence} does not carry the digest of its content.`)
        if (typeof row.detail.root === 'string') checkRoot(sequence, row.detail, leaves.get(sequence) ?? [], fault)
        leaves.delete(sequence)
        previous = row.digest
      }
    }
    for (const sequence of leaves.keys()) fault(`Readings name event ${sequence}, which is not there.`)
    const [head] = await tx<{ sequence: string, digest: Uint8Array }[]>`select sequence, digest from audit_heads where organisation_id = ${organisationId}`
    if (Number(head?.sequence ?? 0) !== events || (head && !Buffer.from(head.digest).equals(previous))) fault('The recorded end of the chain is not the last event.')
    return { events, readings, faults }
  })
}

function checkRoot(sequence: number, detail: Record<string, unknown>, leaves: Uint8Array[], fault: (text: string) => void): void {
  if (leaves.length !== detail.readings) fault(`Event ${sequence} wrote ${String(detail.readings)} readings, ${leaves.length} are there.`)
  const root = Buffer.from(merkleRoot(leaves, bytes => createHash('sha256').update(bytes).digest())).toString('hex')
  if (root !== detail.root) fault(`The readings of event ${sequence} are not those that it recorded.`)
}

/** Digests of all revisions, those superseded included, in the order in which they were written. */
async function leavesByEvent(tx: BulkTransaction, organisationId: string, fault: (text: string) => void): Promise<{ leaves: Map<number, Uint8Array[]>, readings: number }> {
  const leaves = new Map<number, Uint8Array[]>()
  let readings = 0
  const cursor = tx<LeafRow[]>`
    select r.*, i.content_digest from (
      select audit_sequence, ordinal, id, record_digest, submission_id, revision, sampled_at, shop_id, subject_id, instrument_id, declared, verdict, purity_percent,
             reported, verdict_detail, sender, sender_reading_id
      from readings where organisation_id = ${organisationId}
      union all
      select former.audit_sequence, former.ordinal, former.id, former.record_digest, former.submission_id, former.revision, former.sampled_at, former.shop_id, former.subject_id,
             former.instrument_id, former.declared, former.verdict, former.purity_percent, former.reported, former.verdict_detail, former.sender, former.sender_reading_id
      from reading_revisions, jsonb_populate_record(null::readings, snapshot) as former
      where reading_revisions.organisation_id = ${organisationId}
    ) as r
    left join reading_identities i on i.organisation_id = ${organisationId} and i.sender = r.sender and i.sender_reading_id = r.sender_reading_id
    order by r.audit_sequence, r.ordinal, r.id`.cursor(2000)
  for await (const rows of cursor) {
    for (const row of rows) {
      readings++
      const made = row.content_digest && recordDigest({
        readingId: row.id, contentDigest: row.content_digest, submissionId: row.submission_id, ordinal: row.ordinal, revision: row.revision, sampledAt: row.sampled_at,
        shopId: row.shop_id, subjectId: row.subject_id, instrumentId: row.instrument_id, declared: row.declared, reported: row.reported, verdict: row.verdict_detail,
      })
      const listed = row.verdict === row.verdict_detail.kind && row.purity_percent === row.verdict_detail.purityPercent
      if (!made || !made.equals(row.record_digest) || !listed) fault(`Reading ${row.id} is not as it was recorded.`)
      const sequence = Number(row.audit_sequence)
      const list = leaves.get(sequence)
      if (list) list.push(row.record_digest)
      else leaves.set(sequence, [row.record_digest])
    }
  }
  return { leaves, readings }
}
