import { withoutOrganisation } from '../../database/tenancy'
import { QUEUES } from '../../database/queue/definitions'

type Check = 'ok' | 'failed' | 'starting'

/** Set by the plugin that starts queue and workers; a failure there does not stop the server by itself. */
export const started = { queue: false, failure: null as string | null }

/** Asks the database itself: the queue's own client hides a lost connection. */
export async function readiness(): Promise<{ ready: boolean, checks: Record<'database' | 'queue' | 'storage', Check> }> {
  const checks: Record<'database' | 'queue' | 'storage', Check> = { database: 'failed', queue: 'failed', storage: 'failed' }
  try {
    const [row] = await withoutOrganisation(client => client<{ queues: string[], storage: boolean }[]>`
      select (select array_agg(name) from pgboss.queue) as queues,
             has_table_privilege('submission_chunks', 'INSERT') and not pg_is_in_recovery() as storage`)
    checks.database = 'ok'
    const missing = Object.keys(QUEUES).filter(name => !row!.queues.includes(name))
    checks.queue = started.failure || missing.length > 0 ? 'failed' : started.queue ? 'ok' : 'starting'
    // Bytes are kept in the database, so storage is well when it can be written to.
    checks.storage = row!.storage ? 'ok' : 'failed'
  } catch {
    // Told by the checks that stay failed.
  }
  return { ready: Object.values(checks).every(check => check === 'ok'), checks }
}
