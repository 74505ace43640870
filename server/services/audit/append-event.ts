import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'
import type { BulkTransaction } from '../../database/tenancy'

export interface AuditEvent {
  organisationId: string
  at: Date
  /** `person:<id>`, `device:<token id>` or `system`. */
  actor: string
  action: string
  entityKind: string
  entityId: string
  detail: Record<string, unknown>
}

export const EMPTY_CHAIN = Buffer.alloc(32)

/** SHA-256 over the previous digest and the event in canonical JSON (RFC 8785). */
export function chainDigest(previous: Uint8Array, event: AuditEvent & { sequence: number }): Buffer {
  const canonical = canonicalize({
    organisationId: event.organisationId,
    sequence: event.sequence,
    at: event.at.toISOString(),
    actor: event.actor,
    action: event.action,
    entityKind: event.entityKind,
    entityId: event.entityId,
    detail: event.detail,
  })
  return createHash('sha256').update(previous).update(canonical!).digest()
}

/** The end of the organisation's chain, locked until the transaction ends: events of one organisation follow one another. */
export async function lockAuditHead(tx: BulkTransaction, organisationId: string): Promise<{ sequence: number, digest: Uint8Array }> {
  const [head] = await tx<{ sequence: string, digest: Uint8Array }[]>`
    insert into audit_heads (organisation_id, sequence, digest) values (${organisationId}, 0, ${EMPTY_CHAIN})
    on conflict (organisation_id) do update set sequence = audit_heads.sequence
    returning sequence, digest`
  return { sequence: Number(head!.sequence), digest: head!.digest }
}

/**
 * Appends to the chain in the caller's transaction, which changes the data too: neither is there without
 * the other. Call it late in the transaction, since it holds the organisation's chain until the end.
 *
 * @returns the event's sequence number.
 */
export async function appendAuditEvent(tx: BulkTransaction, event: AuditEvent, head?: { sequence: number, digest: Uint8Array }): Promise<number> {
  const end = head ?? await lockAuditHead(tx, event.organisationId)
  const sequence = end.sequence + 1
  const digest = chainDigest(end.digest, { ...event, sequence })
  await Promise.all([
    tx`
      insert into audit_events (organisation_id, sequence, at, actor, action, entity_kind, entity_id, detail, previous_digest, digest)
      values (${event.organisationId}, ${sequence}, ${event.at.toISOString()}, ${event.actor}, ${event.action}, ${event.entityKind}, ${event.entityId},
              ${tx.json(event.detail as never)}, ${Buffer.from(end.digest)}, ${digest})`,
    tx`update audit_heads set sequence = ${sequence}, digest = ${digest} where organisation_id = ${event.organisationId}`,
  ])
  return sequence
}
