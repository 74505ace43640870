import { randomBytes } from 'node:crypto'
import type { CertificateRow } from '#shared/api/certificates'
import type { ReadingDetail } from '#shared/api/readings'
import { CODE_BYTES, codeOf } from '#shared/certificates/code'
import { certificateStatement, type CertificateStatement, type CertifiedInstrument, type Issuer } from '#shared/certificates/statement'
import { withOrganisationBulk, type BulkTransaction } from '../../database/tenancy'
import { appendAuditEvent } from '../audit/append-event'
import { uuidV7 } from '../ids/uuid-v7'
import { getReading } from '../readings/get-reading'
import type { Scope } from '../readings/reading-filters'
import { CertificateWithdrawn } from './certificates.errors'
import { certificatesOfReading } from './certificates.queries'
import { signStatement } from './signing'

/** Who issues: a person, or a device's token. */
export type IssuerId = { kind: 'person', id: string } | { kind: 'device', id: string }

/** A reading that is judged anew this often in the moment of a request is a fault, not a race. */
const MOST_TRIES = 5

/**
 * Issues the certificate of a reading's current revision, or finds the one there is.
 *
 * @returns null where there is no such reading that the caller may see.
 * @throws SigningUnavailable without a key, CertificateWithdrawn where this revision's was withdrawn.
 */
export async function issueCertificate(scope: Scope, readingId: string, issuer: IssuerId, now: Date): Promise<{ row: CertificateRow, isNew: boolean } | null> {
  for (let tries = 0; tries < MOST_TRIES; tries++) {
    const reading = await getReading(scope, readingId)
    if (!reading) return null
    const done = await withOrganisationBulk(scope.organisationId, tx => issueInTransaction(tx, scope.organisationId, reading, issuer, now))
    if (done === 'changed') continue
    const found = (await certificatesOfReading(scope, readingId))?.find(({ row }) => row.readingRevision === reading.revision)
    if (!found) return null
    if (found.row.state === 'withdrawn') throw new CertificateWithdrawn('withdrawn')
    return { row: found.row, isNew: done === 'issued' }
  }
  throw new Error(`Reading ${readingId} changed ${MOST_TRIES} times while its certificate was issued.`)
}

async function issueInTransaction(tx: BulkTransaction, organisationId: string, reading: ReadingDetail, issuer: IssuerId, now: Date): Promise<'issued' | 'there' | 'changed'> {
  const shopId = reading.shop.id
  await tx`insert into certificate_counters (organisation_id, shop_id) values (${organisationId}, ${shopId}) on conflict do nothing`
  // Certificates of a shop follow one another from here on: a number is used, or goes back with the transaction.
  const [counter] = await tx<{ last_number: number }[]>`select last_number from certificate_counters where organisation_id = ${organisationId} and shop_id = ${shopId} for update`
  const there = await tx`select 1 from certificates where organisation_id = ${organisationId} and reading_id = ${reading.id} and reading_revision = ${reading.revision}`
  if (there.length > 0) return 'there'
  const [current] = await tx<{ revision: number }[]>`select revision from readings where organisation_id = ${organisationId} and sampled_at = ${reading.sampledAt} and id = ${reading.id} for share`
  if (current?.revision !== reading.revision) return 'changed'

  const number = counter!.last_number + 1
  const id = uuidV7(now.getTime())
  const statement = asStored(certificateStatement(reading, {
    number,
    code: codeOf(randomBytes(CODE_BYTES)),
    issuedAt: now,
    issuedBy: await issuerOf(tx, organisationId, issuer),
    organisation: (await tx<{ name: string, demo: boolean }[]>`select name, demo from organisations where organisation_id = ${organisationId}`)[0]!,
    instrument: await instrumentOf(tx, organisationId, reading.instrument?.id ?? null),
  }))
  const { signature, keyId } = signStatement(statement)
  await tx`
    insert into certificates (organisation_id, id, shop_id, number, reading_id, reading_revision, code, issued_at, issued_by, content, signature, key_id)
    values (${organisationId}, ${id}, ${shopId}, ${number}, ${reading.id}, ${reading.revision}, ${statement.code}, ${now}, ${`${issuer.kind}:${issuer.id}`}, ${tx.json(statement as never)}, ${signature}, ${keyId})`
  await tx`update certificate_counters set last_number = ${number} where organisation_id = ${organisationId} and shop_id = ${shopId}`
  await appendAuditEvent(tx, {
    organisationId, at: now, actor: `${issuer.kind}:${issuer.id}`, action: 'certificate.issued', entityKind: 'certificate', entityId: id,
    detail: { shopId, number, readingId: reading.id, revision: reading.revision, keyId, signature: signature.toString('base64url') },
  })
  return 'issued'
}

/** Members without a value are gone once it was stored, so what is signed must be without them too. */
const asStored = (statement: CertificateStatement): CertificateStatement => JSON.parse(JSON.stringify(statement)) as CertificateStatement

async function issuerOf(tx: BulkTransaction, organisationId: string, issuer: IssuerId): Promise<Issuer> {
  const [found] = issuer.kind === 'person'
    ? await tx<Issuer[]>`select name, certification from people where organisation_id = ${organisationId} and id = ${issuer.id}`
    : await tx<Issuer[]>`select 'Device token ' || name as name, null as certification from device_tokens where organisation_id = ${organisationId} and id = ${issuer.id}`
  return { name: found!.name, certification: found!.certification }
}

async function instrumentOf(tx: BulkTransaction, organisationId: string, id: string | null): Promise<CertifiedInstrument | null> {
  if (id === null) return null
  const [found] = await tx<{ serial: string, model: string, due: Date | null }[]>`
    select serial, model, calibration_due_at as due from instruments where organisation_id = ${organisationId} and id = ${id}`
  return found ? { serial: found.serial, model: found.model, calibrationDueAt: found.due?.toISOString() ?? null } : null
}
