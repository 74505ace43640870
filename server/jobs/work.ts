import type PgBoss from 'pg-boss'
import { bulkClient } from '../database/client'
import { describeError } from '../database/errors'
import { withOrganisationBulk, withoutOrganisation } from '../database/tenancy'
import { settings } from '../settings'
import { log } from '../utils/log'
import { enqueueIntake, startBoss } from '../database/queue/boss'
import { JOBS_CHANNEL } from '../database/queue/definitions'

const SWEEP_SECONDS = 5
/** A submission that came in longer ago than this and was never taken up is looked at: its job may have gone down with a worker. */
const LOST_AFTER = '15 seconds'

let sweeping: NodeJS.Timeout | null = null

/** Starts this process's workers. Handlers are loaded only here, so that a web-only process does without them. */
export async function startWorkers(): Promise<void> {
  const [{ handleIntake, handleDeadIntake }, { makePartitionsAhead }] = await Promise.all([import('./workers/intake'), import('./workers/partitions')])
  const boss = await startBoss({ supervise: true })
  const intakeWorkers: string[] = []
  const wakeAll = () => {
    for (const id of intakeWorkers) boss.notifyWorker(id)
  }
  for (let i = 0; i < settings().workers; i++) {
    // One job at a time: a batch fails as a whole, and one poison submission must not stop its neighbours.
    intakeWorkers.push(await boss.work('intake', { batchSize: 1, pollingIntervalSeconds: 2 }, async (jobs: PgBoss.Job<unknown>[]) => {
      // A worker that found a job looks for the next one at once; only an empty queue is polled.
      wakeAll()
      await handleIntake(jobs)
    }))
  }
  await boss.work('intake-dead', { batchSize: 1, pollingIntervalSeconds: 10 }, handleDeadIntake)
  await boss.work('partitions-ahead', { batchSize: 1, pollingIntervalSeconds: 60 }, makePartitionsAhead)
  await makePartitionsAhead()
  await bulkClient().listen(JOBS_CHANNEL, wakeAll)
  sweeping = setInterval(() => void sweep(), SWEEP_SECONDS * 1000)
  sweeping.unref()
}

export function stopSweeping(): void {
  if (sweeping) clearInterval(sweeping)
}

/**
 * The submissions are the truth and the queue is a hint: whatever is unsettled and in nobody's hands gets
 * a new job. A submission may then have two; the attempt number lets only the later one write.
 */
async function sweep(): Promise<void> {
  try {
    const candidates = await withoutOrganisation(client => client<{ organisation_id: string, id: string, attempt: number }[]>`
      select * from find_abandoned_submissions(${LOST_AFTER}::interval, 200)`)
    if (candidates.length === 0) return
    // One that still waits in the queue is not lost, only late.
    const waiting = await withoutOrganisation(client => client<{ id: string }[]>`
      select id from pgboss.job where name = 'intake' and id = any(${candidates.map(candidate => candidate.id)}::uuid[]) and state in ('created', 'retry')`)
    const inQueue = new Set(waiting.map(job => job.id))
    for (const { organisation_id: organisationId, id, attempt } of candidates) {
      if (inQueue.has(id)) continue
      await withOrganisationBulk(organisationId, async (tx) => {
        // The lease moves on, so that only one of several sweepers queues it, and not at every round.
        const mine = await tx`
          update submissions set lease_until = now() + interval '1 minute'
          where organisation_id = ${organisationId} and id = ${id} and attempt = ${attempt} and status in ('received', 'processing')
            and coalesce(lease_until, received_at + ${LOST_AFTER}::interval) < now() returning id`
        if (mine.length > 0) await Promise.all(enqueueIntake(tx, [{ organisationId, submissionId: id }], 'again'))
      })
    }
  } catch (error) {
    log('warn', 'sweep failed', { error: describeError(error) })
  }
}
