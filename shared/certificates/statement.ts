import type { ReadingDetail } from '../api/readings'
import type { SubjectKind } from '../intake/kinds'
import type { ReportedComposition } from '../composition/types'

/**
 * What a certificate says, complete: it is signed as it stands and drawn from it alone, so that a
 * certificate stays what it was when names, instruments or words change. Numbers are percent by mass
 * unless a rule's unit says otherwise; instants are ISO 8601 in UTC.
 */
export interface CertificateStatement extends Pick<ReadingDetail,
  'declared' | 'purityPercent' | 'purityUncertainty' | 'resolution' | 'composition' | 'rules' | 'decidedBy' | 'decidedBySubstance' | 'marks' | 'limitSet' | 'conditions' | 'attempt' | 'flags'> {
  schema: 'coldslip-certificate/1'
  /** Counts within the shop, without gaps. */
  number: number
  /** Last part of the public address. */
  code: string
  issuedAt: string
  issuedBy: Issuer
  organisation: string
  /** True where everything of this organisation is invented. */
  demo: boolean
  shop: { name: string, timeZone: string }
  reading: { id: string, revision: number, sampledAt: string, receivedAt: string, digest: string, auditSequence: number }
  subject: { kind: SubjectKind, label: string, vin: string | null, plate: string | null, workOrder: string | null }
  verdict: { kind: ReadingDetail['verdict'], tag: string, nextStep: string, reason: string, cautions: string[] }
  reported: ReportedComposition
  instrument: CertifiedInstrument | null
  /** Who took the sample, as the instrument or the person recorded it. */
  operator: string | null
  notShown: string[]
}

export interface Issuer {
  name: string
  /** Number or name of the person's certification, where one is recorded. */
  certification: string | null
}

/** The instrument as it was on record when the certificate was issued. */
export interface CertifiedInstrument {
  serial: string
  model: string
  calibrationDueAt: string | null
}

/** Stands on every certificate: what nobody may read into it. */
export const NOT_SHOWN: readonly string[] = [
  'Moisture, oil, acid and particles: they were not measured.',
  'The rest of the charge: a small sample was looked at, at one port and one moment.',
  'The charge since then: anything that was connected, added or opened afterwards.',
  'That the refrigerant is pure, or that it meets a standard for new, recycled or reclaimed refrigerant.',
  'How anything else than the declared refrigerant came in, or who brought it there.',
]

export interface CertificateOccasion {
  number: number
  code: string
  issuedAt: Date
  issuedBy: Issuer
  organisation: { name: string, demo: boolean }
  instrument: CertifiedInstrument | null
}

/** The statement on a reading as it stands now. The same reading and occasion always give the same statement. */
export function certificateStatement(reading: ReadingDetail, occasion: CertificateOccasion): CertificateStatement {
  const { declared, purityPercent, purityUncertainty, resolution, composition, rules, decidedBy, decidedBySubstance, marks, limitSet, conditions, attempt, flags, reported } = reading
  const { kind, label, vin, plate, workOrder } = reading.subject
  const { tag, nextStep, reason, cautions } = reading.words
  return {
    schema: 'coldslip-certificate/1',
    number: occasion.number,
    code: occasion.code,
    issuedAt: occasion.issuedAt.toISOString(),
    issuedBy: occasion.issuedBy,
    organisation: occasion.organisation.name,
    demo: occasion.organisation.demo,
    shop: { name: reading.shop.name, timeZone: reading.shop.timeZone },
    reading: { id: reading.id, revision: reading.revision, sampledAt: reading.sampledAt, receivedAt: reading.receivedAt, digest: reading.digest, auditSequence: reading.auditSequence },
    subject: { kind, label, vin, plate, workOrder },
    verdict: { kind: reading.verdict, tag, nextStep, reason, cautions },
    declared, purityPercent, purityUncertainty, resolution, reported, composition, rules, decidedBy, decidedBySubstance, marks, limitSet, conditions, attempt, flags,
    instrument: occasion.instrument,
    operator: reading.operator,
    notShown: [...NOT_SHOWN],
  }
}
