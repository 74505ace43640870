import { withOrganisationBulk } from '../../database/tenancy'
import { appendAuditEvent } from '../audit/append-event'
import type { Scope } from '../readings/reading-filters'

/** Whether there is such a certificate in the caller's shops. */
export async function certificateExists(scope: Scope, id: string): Promise<boolean> {
  const { organisationId } = scope
  const found = await withOrganisationBulk(organisationId, tx => tx`select 1 from certificates where organisation_id = ${organisationId} and id = ${id} and shop_id = any(${scope.shopIds}::uuid[])`)
  return found.length > 0
}

/** Withdraws for good; the number stays used. @returns false where it was withdrawn before. */
export async function withdrawCertificate(scope: Scope, { id, personId, reason, now }: { id: string, personId: string, reason: string, now: Date }): Promise<boolean> {
  const { organisationId } = scope
  return withOrganisationBulk(organisationId, async (tx) => {
    const withdrawn = await tx<{ number: number }[]>`
      update certificates set withdrawn_at = ${now}, withdrawn_by = ${personId}, withdrawal_reason = ${reason}
      where organisation_id = ${organisationId} and id = ${id} and shop_id = any(${scope.shopIds}::uuid[]) and withdrawn_at is null returning number`
    if (withdrawn.length === 0) return false
    await appendAuditEvent(tx, {
      organisationId, at: now, actor: `person:${personId}`, action: 'certificate.withdrawn', entityKind: 'certificate', entityId: id, detail: { number: withdrawn[0]!.number, reason },
    })
    return true
  })
}
