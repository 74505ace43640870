import type { SumCheck } from '../composition/types'
import { checkVin } from '../vehicles/vin'
import type { Flag } from './kinds'
import { AHEAD_MINUTES, LATE_DAYS } from './limits'
import type { PurityReading } from './reading-schema'

const MINUTE = 60_000
const DAY = 86_400_000

export interface FlagInput {
  reading: PurityReading
  sum: SumCheck
  receivedAt: Date
}

/**
 * What is told with a reading that was taken, as far as the reading itself shows it: `ahead` (sampled
 * more than 10 minutes after it was received), `late` (more than 30 days before), `sum`, and
 * `vin-check-digit` (17 characters that are no VIN of 49 CFR 565; shorter numbers of old or foreign
 * vehicles say nothing). Flags that need the instrument or other readings are added elsewhere.
 */
export function flagsFor({ reading, sum, receivedAt }: FlagInput): Flag[] {
  const flags: Flag[] = []
  const age = receivedAt.getTime() - Date.parse(reading.sampledAt)
  if (age < -AHEAD_MINUTES * MINUTE) flags.push('ahead')
  if (age > LATE_DAYS * DAY) flags.push('late')
  if (sum.outcome === 'flagged') flags.push('sum')
  if (failsAsVin(reading.subject)) flags.push('vin-check-digit')
  return flags
}

function failsAsVin(subject: PurityReading['subject']): boolean {
  if (subject.kind !== 'vehicle' || subject.vin === undefined) return false
  const { valid, length } = checkVin({ vin: subject.vin })
  return length === 17 && !valid
}
