import type PgBoss from 'pg-boss'
import { describeError } from '../../database/errors'
import { abandonSubmission } from '../../services/ingest/abandon-submission'
import { processSubmission } from '../../services/ingest/process-submission'
import { QUEUES } from '../../database/queue/definitions'
import { log } from '../../utils/log'

/** A handler parses its payload before anything else; what a sender did wrong never throws, so a retry always means a fault. */
export async function handleIntake(jobs: PgBoss.Job<unknown>[]): Promise<void> {
  for (const job of jobs) {
    const payload = QUEUES.intake.payload.parse(job.data)
    try {
      await processSubmission(payload)
    } catch (error) {
      log('error', 'intake failed', { submissionId: payload.submissionId, jobId: job.id, error: describeError(error) })
      // The queue keeps what is thrown: never the wrapper's message, which carries parameters.
      throw new Error(describeError(error))
    }
  }
}

/** After the last retry: the submission is settled as failed; its bytes stay, and it can be sent through again. */
export async function handleDeadIntake(jobs: PgBoss.Job<unknown>[]): Promise<void> {
  for (const job of jobs) await abandonSubmission(QUEUES['intake-dead'].payload.parse(job.data))
}
