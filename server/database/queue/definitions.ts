import { z } from 'zod'

/**
 * The queues, their payloads and options: the only place they are declared. A payload carries ids only;
 * a field added later is optional, because jobs queued by the old release still run.
 */
export const intakePayload = z.object({
  organisationId: z.uuid(),
  submissionId: z.uuid(),
})
export type IntakePayload = z.infer<typeof intakePayload>

export const QUEUES = {
  /** One job a submission. Retries mean a fault; what a sender did wrong ends as refused rows or a failed submission. */
  intake: {
    payload: intakePayload,
    options: { policy: 'standard', retryLimit: 5, retryDelay: 2, retryBackoff: true, expireInSeconds: 900, retentionDays: 14, deadLetter: 'intake-dead' },
  },
  'intake-dead': {
    payload: intakePayload,
    options: { policy: 'standard', retryLimit: 3, retryDelay: 30, retryBackoff: true, expireInSeconds: 120, retentionDays: 30 },
  },
  /** Makes the partitions of the coming months; scheduled daily. */
  'partitions-ahead': {
    payload: z.object({}),
    options: { policy: 'standard', retryLimit: 3, retryDelay: 60, retryBackoff: true, expireInSeconds: 120, retentionDays: 7 },
  },
} as const

export type QueueName = keyof typeof QUEUES

/** Channel on which an enqueuing transaction wakes the workers; polling is the net under it. */
export const JOBS_CHANNEL = 'coldslip_jobs'
/** Channel on which a worker's transaction tells what is new: `{ organisationId, submissionId, readingIds, count }`. */
export const NEWS_CHANNEL = 'coldslip_news'
