import { z } from 'zod'
import type { CertificateRow, PublicCertificate } from '../api/certificates'
import { DESIGNATIONS } from '../refrigerants/designations'
import { VERDICTS } from '../verdict/types'

// The answers on certificates, for the published document; each must fit its type, or this file doesn't compile.

const moment = z.string().meta({ format: 'date-time' })
const day = z.string().meta({ format: 'date' }).describe('Day in the shop\'s zone.')
const state = z.enum(['genuine', 'superseded', 'withdrawn']).describe('superseded: the reading was corrected or judged anew after the certificate was issued.')
const number = z.int().min(1).describe('Counts within the shop, without gaps.')
const code = z.string().length(16).describe('Last part of the public address.')

export const certificateAnswer: z.ZodType<CertificateRow> = z.looseObject({
  id: z.string(),
  number,
  code,
  state,
  readingRevision: z.int().min(1),
  issuedAt: moment,
  issuedBy: z.string(),
  withdrawn: z.looseObject({ at: moment, by: z.string(), reason: z.string() }).nullable(),
})

export const publicCertificateAnswer: z.ZodType<PublicCertificate> = z.looseObject({
  state,
  code,
  number,
  shop: z.string(),
  demo: z.boolean().describe('True where everything of the organisation is invented.'),
  issuedOn: day,
  sampledOn: day,
  withdrawnOn: day.nullable(),
  verdict: z.enum(VERDICTS),
  declared: z.enum(DESIGNATIONS),
  digest: z.string().length(64).describe('SHA-256 of the reading\'s record in canonical form, in hexadecimal.'),
})

export const signedCertificateAnswer = z.looseObject({
  statement: z.looseObject({ schema: z.literal('coldslip-certificate/1'), number, code, issuedAt: moment }).describe('All that the certificate says.'),
  signature: z.looseObject({
    algorithm: z.literal('Ed25519'),
    canonicalisation: z.literal('RFC 8785').describe('How the signed bytes are made of the statement.'),
    keyId: z.string().length(16).describe('The "kid" in /.well-known/coldslip-keys.json: the first 16 hexadecimal digits of the SHA-256 of the public key.'),
    value: z.string().describe('64 bytes, base64url.'),
  }),
})
