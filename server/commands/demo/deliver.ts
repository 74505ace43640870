import { createHash } from 'node:crypto'
import type { DemoSubmission } from '#fixtures/demo/types'
import { withOrganisationBulk } from '#server/database/tenancy'
import { uuidV7 } from '#server/services/ids/uuid-v7'
import { processSubmission } from '#server/services/ingest/process-submission'
import { CHUNK_BYTES } from '#server/services/ingest/spool'
import type { LoadedOrganisation } from './ensure-organisation'

/** Long enough that no sweeper of a running server takes up what this process is about to work on. */
const LEASE = '5 minutes'

/**
 * Stores one delivery as if it had come at its time, and takes it in at once, without the queue.
 * @param key names the delivery; one that an earlier run settled is passed over, one that it left open is finished
 */
export async function deliver({ organisationId, shopIds, instrumentIds, personIds }: LoadedOrganisation, given: DemoSubmission, key: string): Promise<void> {
  const bytes = Buffer.from(given.bytes)
  const shopId = shopIds.get(given.shop)!
  const instrumentId = given.instrumentSerial === null ? null : instrumentIds.get(given.instrumentSerial)!
  const [kind, name] = splitSender(given.sender)
  const senderId = { instrument: instrumentIds, shop: shopIds, person: personIds }[kind].get(name)!
  const sender = `${kind}:${senderId}`
  const submissionId = await withOrganisationBulk(organisationId, async (tx) => {
    const id = uuidV7(given.receivedAt.getTime())
    const made = await tx`
      insert into submissions (organisation_id, id, shop_id, source, sender, instrument_id, person_id, media_type, byte_length, sha256, idempotency_key, received_at, lease_until)
      values (${organisationId}, ${id}, ${shopId}, ${given.source}, ${sender}, ${instrumentId}, ${kind === 'person' ? senderId : null}, ${given.mediaType}, ${bytes.length},
        ${createHash('sha256').update(bytes).digest()}, ${key}, ${given.receivedAt}, now() + ${LEASE}::interval)
      on conflict do nothing returning id`
    if (made.length === 0) {
      const [open] = await tx<{ id: string }[]>`
        select id from submissions where organisation_id = ${organisationId} and sender = ${sender} and idempotency_key = ${key} and status in ('received', 'processing')`
      return open?.id ?? null
    }
    const chunks = Array.from({ length: Math.ceil(bytes.length / CHUNK_BYTES) }, (_, ordinal) => ({
      organisation_id: organisationId, submission_id: id, ordinal, bytes: bytes.subarray(ordinal * CHUNK_BYTES, (ordinal + 1) * CHUNK_BYTES),
    }))
    await tx`insert into submission_chunks ${tx(chunks)}`
    return id
  })
  if (submissionId !== null) await processSubmission({ organisationId, submissionId })
}

function splitSender(sender: string): ['instrument' | 'shop' | 'person', string] {
  const at = sender.indexOf(':')
  return [sender.slice(0, at) as 'instrument' | 'shop' | 'person', sender.slice(at + 1)]
}
