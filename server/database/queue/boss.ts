import PgBoss from 'pg-boss'
import type { BulkTransaction } from '../tenancy'
import { settings } from '../../settings'
import { JOBS_CHANNEL, QUEUES, type IntakePayload } from './definitions'

let boss: PgBoss | null = null

/** Errors of the queue's own housekeeping; readiness asks the job table itself, because the queue hides a lost database. */
export let lastQueueError: { at: Date, text: string } | null = null

/** Starts the queue's client; with `supervise` this process also archives, expires and schedules. */
export async function startBoss({ supervise }: { supervise: boolean }): Promise<PgBoss> {
  const started = new PgBoss({
    connectionString: settings().databaseUrl,
    application_name: 'coldslip queue',
    max: 4,
    // The owner migrates; the application's role may not create anything.
    migrate: false,
    supervise,
    schedule: supervise,
    maintenanceIntervalSeconds: 10,
  })
  started.on('error', (error) => {
    lastQueueError = { at: new Date(), text: error.message.slice(0, 200) }
  })
  await started.start()
  boss = started
  return started
}

export async function stopBoss(): Promise<void> {
  const stopping = boss
  boss = null
  // Below Nitro's own limit; a job cut off is taken up again by the sweeper.
  await stopping?.stop({ graceful: true, wait: true, timeout: 8000 })
}

/**
 * Queues intake jobs in the caller's transaction, so that bytes and job commit together, and wakes the
 * workers when it commits. The queue answers nothing here: that every queue exists is asked at readiness.
 *
 * The first job of a submission bears the submission's id, so that the sweeper can find it by key; a
 * later one gets an id of its own.
 */
export function enqueueIntake(tx: BulkTransaction, payloads: IntakePayload[], which: 'first' | 'again'): Promise<unknown>[] {
  if (!boss) throw new Error('The queue is not started')
  const jobs = payloads.map(payload => ({ name: 'intake', ...(which === 'first' ? { id: payload.submissionId } : {}), data: QUEUES.intake.payload.parse(payload) }))
  const inserted = boss.insert(jobs, {
    db: {
      // The queue hands its first parameter over as JSON text; the plain client would encode it again.
      executeSql: async (text, values) => ({
        rows: await tx.unsafe(text, values.map((value, i) => (i === 0 ? JSON.parse(value as string) : value ?? null))) as unknown as object[],
        rowCount: 0,
      }),
    },
  } as PgBoss.InsertOptions)
  return [inserted, tx`select pg_notify(${JOBS_CHANNEL}, '')`]
}
