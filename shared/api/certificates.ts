import { z } from 'zod'
import type { CertificateStatement } from '../certificates/statement'
import type { Designation } from '../refrigerants/designations'
import type { VerdictKind } from '../verdict/types'

/** `superseded`: the reading was corrected or judged anew after the certificate was issued. */
export type CertificateState = 'genuine' | 'superseded' | 'withdrawn'

/** A certificate as those see it who may see its reading. */
export interface CertificateRow {
  id: string
  number: number
  code: string
  state: CertificateState
  readingRevision: number
  issuedAt: string
  issuedBy: string
  withdrawn: { at: string, by: string, reason: string } | null
}

/** What anybody with the code sees: nothing of customer, vehicle or people. */
export interface PublicCertificate {
  state: CertificateState
  code: string
  number: number
  shop: string
  demo: boolean
  /** Days in the shop's zone, `YYYY-MM-DD`. */
  issuedOn: string
  sampledOn: string
  withdrawnOn: string | null
  verdict: VerdictKind
  declared: Designation
  /** SHA-256 of the reading's record in canonical form. */
  digest: string
}

/** The certificate for programs: the statement, and what proves it. */
export interface SignedCertificate {
  statement: CertificateStatement
  signature: { algorithm: 'Ed25519', canonicalisation: 'RFC 8785', keyId: string, value: string }
}

export const withdrawBody = z.strictObject({ reason: z.string().trim().min(3, 'Say why, in a few words.').max(500) })

export const certificateQuery = z.object({ format: z.enum(['a4', 'letter']).default('a4') })
