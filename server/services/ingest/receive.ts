import type { SubmissionSource } from '#shared/intake/kinds'
import { databaseErrorCode, isPassing } from '../../database/errors'
import { withOrganisationBulk, type BulkTransaction } from '../../database/tenancy'
import { enqueueIntake } from '../../database/queue/boss'
import { uuidV7 } from '../ids/uuid-v7'
import { IntakeRefused } from './ingest.errors'
import { CHUNK_BYTES, type Spool } from './spool'

/** A delivery that passed the door, not yet stored. */
export interface Delivery {
  organisationId: string
  shopId: string
  source: SubmissionSource
  /** Whose reading ids these are; see the table `submissions`. */
  sender: string
  instrumentId: string | null
  personId: string | null
  mediaType: string
  contentEncoding: string | null
  spool: Spool
  sha256: Buffer
  idempotencyKey: string | null
  receivedAt: Date
}

export interface Receipt {
  submissionId: string
  /** True where the same key had brought the same bytes before: nothing was stored this time. */
  replayed: boolean
  /** What the first request was told, where that was kept. */
  firstAnswer: { status: number, body: unknown } | null
}

interface Waiting {
  id: string
  delivery: Delivery
  resolve: (receipt: Receipt) => void
  reject: (error: unknown) => void
}

/** How many deliveries share one transaction at most, and how many such transactions one organisation has at once. */
const GROUP = 64
const GROUPS_AT_ONCE = 2

const queues = new Map<string, { waiting: Waiting[], running: number }>()

/**
 * Stores a delivery with its job and answers after the commit: until then nothing is acknowledged.
 * Deliveries that wait at the same moment share one transaction (group commit); where it fails, each is
 * tried alone, so that one can't take the others with it.
 *
 * @throws IntakeRefused 422 for another content under the same key, 409 while the first is under way,
 * 503 where the database can't be reached.
 */
export function receive(delivery: Delivery): Promise<Receipt> {
  return new Promise((resolve, reject) => {
    let queue = queues.get(delivery.organisationId)
    if (!queue) queues.set(delivery.organisationId, queue = { waiting: [], running: 0 })
    queue.waiting.push({ id: uuidV7(delivery.receivedAt.getTime()), delivery, resolve, reject })
    runQueue(delivery.organisationId, queue)
  })
}

function runQueue(organisationId: string, queue: { waiting: Waiting[], running: number }): void {
  while (queue.waiting.length > 0 && queue.running < GROUPS_AT_ONCE) {
    const group = takeGroup(queue.waiting)
    queue.running++
    void settleGroup(organisationId, group).finally(() => {
      queue.running--
      if (queue.waiting.length === 0 && queue.running === 0) queues.delete(organisationId)
      else runQueue(organisationId, queue)
    })
  }
}

/** Small deliveries share a transaction; a key stands only once in a group, and a large file goes alone. */
function takeGroup(waiting: Waiting[]): Waiting[] {
  const keys = new Set<string>()
  const group: Waiting[] = []
  for (let i = 0; i < waiting.length && group.length < GROUP;) {
    const item = waiting[i]!
    const key = item.delivery.idempotencyKey === null ? null : `${item.delivery.sender}\n${item.delivery.idempotencyKey}`
    const large = item.delivery.spool.whole() === null
    if ((key !== null && keys.has(key)) || (large && group.length > 0)) {
      i++
      continue
    }
    if (key !== null) keys.add(key)
    group.push(item)
    waiting.splice(i, 1)
    if (large) break
  }
  return group
}

async function settleGroup(organisationId: string, group: Waiting[]): Promise<void> {
  try {
    await withOrganisationBulk(organisationId, async (tx) => {
      await store(tx, organisationId, group)
    })
    for (const item of group) item.resolve({ submissionId: item.id, replayed: false, firstAnswer: null })
  } catch (error) {
    if (isPassing(error)) {
      const refused = new IntakeRefused(503, 'unavailable', 'The record could not be stored just now. Nothing was taken; send it again.', { headers: { 'retry-after': '2' } })
      for (const item of group) item.reject(refused)
      return
    }
    for (const item of group) await settleAlone(organisationId, item)
  }
}

async function settleAlone(organisationId: string, item: Waiting): Promise<void> {
  try {
    item.resolve(await withOrganisationBulk(organisationId, async (tx) => {
      // A request with the same key that is still being stored holds the key: wait for it, but not for ever.
      await tx`set local lock_timeout = '5s'`
      const { sender, idempotencyKey, sha256 } = item.delivery
      if (idempotencyKey !== null) {
        const [first] = await tx<{ id: string, sha256: Uint8Array, first_answer: Receipt['firstAnswer'] }[]>`
          select id, sha256, first_answer from submissions
          where organisation_id = ${organisationId} and sender = ${sender} and idempotency_key = ${idempotencyKey}`
        if (first) {
          if (!Buffer.from(first.sha256).equals(sha256)) throw new IntakeRefused(422, 'key-reused', 'This Idempotency-Key came before with other bytes. Use a new key for a new delivery.')
          return { submissionId: first.id, replayed: true, firstAnswer: first.first_answer }
        }
      }
      await store(tx, organisationId, [item])
      return { submissionId: item.id, replayed: false, firstAnswer: null }
    }))
  } catch (error) {
    const code = databaseErrorCode(error)
    // Lost the race for the key after looking: the first is committed now, so look again.
    if (code === '23505') await settleAlone(organisationId, item)
    else if (code === '55P03') item.reject(new IntakeRefused(409, 'under-way', 'The first request with this Idempotency-Key is still under way.', { headers: { 'retry-after': '1' } }))
    else if (isPassing(error)) item.reject(new IntakeRefused(503, 'unavailable', 'The record could not be stored just now. Nothing was taken; send it again.', { headers: { 'retry-after': '2' } }))
    else item.reject(error)
  }
}

/** Bytes, row and job in the caller's transaction; the statements are sent without waiting for one another. */
async function store(tx: BulkTransaction, organisationId: string, group: Waiting[]): Promise<void> {
  const rows = group.map(({ id, delivery }) => ({
    organisation_id: organisationId,
    id,
    shop_id: delivery.shopId,
    source: delivery.source,
    sender: delivery.sender,
    instrument_id: delivery.instrumentId,
    person_id: delivery.personId,
    media_type: delivery.mediaType,
    content_encoding: delivery.contentEncoding,
    byte_length: delivery.spool.byteLength,
    sha256: delivery.sha256,
    idempotency_key: delivery.idempotencyKey,
    status: 'received',
    received_at: delivery.receivedAt,
  }))
  const submitted = tx`insert into submissions ${tx(rows)}`
  const large = group[0]!.delivery.spool.whole() === null
  const stored = large
    ? storeLarge(tx, organisationId, group[0]!)
    : tx`insert into submission_chunks ${tx(group.flatMap(({ id, delivery }) => chunkRows(organisationId, id, delivery)))}`
  await Promise.all([submitted, stored, ...enqueueIntake(tx, group.map(({ id }) => ({ organisationId, submissionId: id })), 'first')])
}

function chunkRows(organisationId: string, submissionId: string, { spool }: Delivery) {
  const whole = spool.whole()!
  const pieces = whole.length === 0 ? [whole] : Array.from({ length: Math.ceil(whole.length / CHUNK_BYTES) }, (_, i) => whole.subarray(i * CHUNK_BYTES, (i + 1) * CHUNK_BYTES))
  return pieces.map((bytes, ordinal) => ({ organisation_id: organisationId, submission_id: submissionId, ordinal, bytes }))
}

async function storeLarge(tx: BulkTransaction, organisationId: string, { id, delivery }: Waiting): Promise<void> {
  let ordinal = 0
  for await (const bytes of delivery.spool.chunks()) {
    await tx`insert into submission_chunks (organisation_id, submission_id, ordinal, bytes) values (${organisationId}, ${id}, ${ordinal++}, ${bytes})`
  }
}
