import type { CertificateState, PublicCertificate } from '#shared/api/certificates'
import { readCode } from '#shared/certificates/code'
import type { Designation } from '#shared/refrigerants/designations'
import { dayIn } from '#shared/text/times'
import type { VerdictKind } from '#shared/verdict/types'
import { withoutOrganisation } from '../../database/tenancy'

interface Found {
  state: CertificateState, number: number, shop_name: string, time_zone: string, demo: boolean, issued_at: Date, withdrawn_at: Date | null
  sampled_at: Date, verdict: VerdictKind, declared: Designation, digest: string
}

/** What anybody with the code may know; null where there is no such certificate. */
export async function findPublicCertificate(typed: string): Promise<PublicCertificate | null> {
  const code = readCode(typed)
  if (!code) return null
  const [found] = await withoutOrganisation(client => client<Found[]>`select * from find_certificate(${code})`)
  if (!found) return null
  const day = (at: Date) => dayIn(at.toISOString(), found.time_zone)
  return {
    state: found.state,
    code,
    number: found.number,
    shop: found.shop_name,
    demo: found.demo,
    issuedOn: day(found.issued_at),
    sampledOn: day(found.sampled_at),
    withdrawnOn: found.withdrawn_at && day(found.withdrawn_at),
    verdict: found.verdict,
    declared: found.declared,
    digest: found.digest,
  }
}
