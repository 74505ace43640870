import type { Flag, SubjectKind, SubmissionSource, SubmissionStatus } from './kinds'

/** What was noted with a reading that was taken all the same. */
export const FLAG_WORDS: Record<Flag, string> = {
  'ahead': 'Sampling time ahead of arrival',
  'sum': 'Parts do not add up to 100 within rounding',
  'fraction': 'Percentages look like fractions of one',
  'vin-check-digit': 'VIN fails its check digit',
  'near-duplicate': 'Much like another reading of the same minute',
  'calibration-overdue': 'Instrument calibration overdue',
  'filter-spent': 'Instrument filter spent',
  'ambient-range': 'Ambient temperature outside the instrument\u2019s range',
  'late': 'Arrived long after sampling',
  'unknown-instrument': 'Instrument not known here',
}

export const SUBJECT_NAMES: Record<SubjectKind, string> = { vehicle: 'Vehicle', cylinder: 'Cylinder', lot: 'Lot', check: 'Check standard' }

export const SOURCE_NAMES: Record<SubmissionSource, string> = { device: 'Device', file: 'File', slip: 'Slip', hand: 'By hand' }

export const STATUS_NAMES: Record<SubmissionStatus, string> = { received: 'Waiting', processing: 'Being read', done: 'Done', failed: 'Could not be read' }
