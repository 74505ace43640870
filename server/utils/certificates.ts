import type { H3Event } from 'h3'
import { certificatesOfReading, type StoredCertificate } from '../services/certificates/certificates.queries'
import type { IssuerId } from '../services/certificates/issue-certificate'
import type { Scope } from '../services/readings/reading-filters'
import { settings } from '../settings'
import { requireDevice, requireMember, requireReader } from './guards'
import { Problem, notFound } from './problem'
import { idFromPath } from './validate'

/** Who may issue: a signed-in person who sees the reading, or a token that both sends and reads. */
export async function requireIssuer(event: H3Event): Promise<{ scope: Scope, issuer: IssuerId }> {
  if (getHeader(event, 'authorization')) {
    await requireDevice(event, 'intake')
    const device = await requireDevice(event, 'read')
    return { scope: { organisationId: device.organisationId, shopIds: [device.shopId] }, issuer: { kind: 'device', id: device.tokenId } }
  }
  const member = await requireMember(event, 'readings.see')
  return { scope: member, issuer: { kind: 'person', id: member.personId } }
}

/** The certificate of the current revision of the reading in the path. @throws Problem 404, telling a reading without one from no reading. */
export async function readCertificate(event: H3Event): Promise<StoredCertificate> {
  const scope = await requireReader(event)
  const found = await certificatesOfReading(scope, idFromPath(event))
  if (!found) throw notFound()
  const current = found.find(({ row }) => row.state !== 'superseded')
  if (current) return current
  throw new Problem(404, 'no-certificate', `No certificate has been issued for this reading${found.length > 0 ? ' as it stands now' : ''}. POST …/certificate issues one, with a token for intake and read, or the button on the reading's page.`)
}

/** Address of the public page of a certificate. */
export function verifyAddress(event: H3Event, code: string): string {
  return `${settings().publicUrl ?? getRequestURL(event).origin}/verify/${code}`
}
