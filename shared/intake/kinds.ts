/**
 * Submission: one delivery as it arrived (a POST, a file, a slip), kept byte for byte with its SHA-256.
 * Reading: one sampled composition, normalised, with revisions.
 * Refused row: a record of a submission that could not become a reading, with place, reason and mend.
 * Subject: what was sampled. Verdict: the next step for a reading.
 */
export const SUBJECT_KINDS = ['vehicle', 'cylinder', 'lot', 'check'] as const
export type SubjectKind = (typeof SUBJECT_KINDS)[number]

export const SUBMISSION_SOURCES = ['device', 'file', 'slip', 'hand'] as const
export type SubmissionSource = (typeof SUBMISSION_SOURCES)[number]

/** `received`: committed, waiting. `processing`: a worker has it. `done`: every record accepted or refused. `failed`: could not be read as a whole. */
export const SUBMISSION_STATUSES = ['received', 'processing', 'done', 'failed'] as const
export type SubmissionStatus = (typeof SUBMISSION_STATUSES)[number]

/** What is told with a reading that was taken, but not without remark. */
export const FLAGS = ['ahead', 'sum', 'fraction', 'vin-check-digit', 'near-duplicate', 'calibration-overdue', 'filter-spent', 'ambient-range', 'late', 'unknown-instrument'] as const
export type Flag = (typeof FLAGS)[number]
