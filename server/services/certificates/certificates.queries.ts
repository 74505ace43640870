import type { CertificateRow, CertificateState } from '#shared/api/certificates'
import type { CertificateStatement } from '#shared/certificates/statement'
import { withOrganisationBulk } from '../../database/tenancy'
import { instantOfUuidV7 } from '../ids/uuid-v7'
import type { Scope } from '../readings/reading-filters'

/** A certificate with all that proves it. */
export interface StoredCertificate {
  row: CertificateRow
  statement: CertificateStatement
  signature: Uint8Array
  keyId: string
}

interface Selected {
  id: string, number: number, code: string, reading_revision: number, revision: number, issued_at: Date, content: CertificateStatement
  signature: Uint8Array, key_id: string, withdrawn_at: Date | null, withdrawn_by_name: string | null, withdrawal_reason: string | null
}

export function stateOf({ withdrawn, revision, certified }: { withdrawn: boolean, revision: number, certified: number }): CertificateState {
  if (withdrawn) return 'withdrawn'
  return revision > certified ? 'superseded' : 'genuine'
}

/** All certificates of a reading, the latest first; null where there is no such reading that the caller may see. */
export async function certificatesOfReading(scope: Scope, readingId: string): Promise<StoredCertificate[] | null> {
  const sampledAt = instantOfUuidV7(readingId)
  if (!sampledAt) return null
  const { organisationId } = scope
  const rows = await withOrganisationBulk(organisationId, tx => tx<(Selected | { id: null })[]>`
    select c.id, c.number, c.code, c.reading_revision, r.revision, c.issued_at, c.content, c.signature, c.key_id, c.withdrawn_at, c.withdrawal_reason, p.name as withdrawn_by_name
    from readings r
    left join certificates c on c.organisation_id = r.organisation_id and c.reading_id = r.id
    left join people p on p.organisation_id = c.organisation_id and p.id = c.withdrawn_by
    where r.organisation_id = ${organisationId} and r.sampled_at = ${sampledAt} and r.id = ${readingId} and r.shop_id = any(${scope.shopIds}::uuid[])
    order by c.reading_revision desc`)
  if (rows.length === 0) return null
  return rows.filter(row => row.id !== null).map(row => storedOf(row as Selected))
}

function storedOf(row: Selected): StoredCertificate {
  return {
    row: {
      id: row.id,
      number: row.number,
      code: row.code,
      state: stateOf({ withdrawn: row.withdrawn_at !== null, revision: row.revision, certified: row.reading_revision }),
      readingRevision: row.reading_revision,
      issuedAt: row.issued_at.toISOString(),
      issuedBy: row.content.issuedBy.name,
      withdrawn: row.withdrawn_at && { at: row.withdrawn_at.toISOString(), by: row.withdrawn_by_name ?? '', reason: row.withdrawal_reason ?? '' },
    },
    statement: row.content,
    signature: row.signature,
    keyId: row.key_id,
  }
}
