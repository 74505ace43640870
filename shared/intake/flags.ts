import type { SumCheck } from '../composition/types'
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
 * `vin-check-digit`. Flags that need the instrument or other readings are added elsewhere.
 */
export function flagsFor({ reading, sum, receivedAt }: FlagInput): Flag[] {
  const flags: Flag[] = []
  const age = receivedAt.getTime() - Date.parse(reading.sampledAt)
  if (age < -AHEAD_MINUTES * MINUTE) flags.push('ahead')
  if (age > LATE_DAYS * DAY) flags.push('late')
  if (sum.outcome === 'flagged') flags.push('sum')
  return flags
}
