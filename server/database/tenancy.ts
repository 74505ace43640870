import { sql } from 'drizzle-orm'
import type postgres from 'postgres'
import { bulkClient, database, type Database } from './client'
import { DatabaseUnavailable } from './errors'

/** A transaction of one organisation. */
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0]
export type BulkTransaction = postgres.TransactionSql

/** The driver can wait for ever on a server that accepts and closes, so every door has a deadline of its own. */
const START_MILLISECONDS = 6_000

/**
 * Runs `work` with a deadline on its start: where no connection could be had in time the caller is told
 * at once. What was started is left to the statement time-out of the connection.
 */
async function withDeadline<T>(run: (started: () => void) => Promise<T>): Promise<T> {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new DatabaseUnavailable('no connection in time')), START_MILLISECONDS)
    timer.unref()
  })
  const started = () => {
    clearTimeout(timer)
    timer = undefined
  }
  const running = run(started)
  try {
    return await Promise.race([running, late])
  } finally {
    clearTimeout(timer)
    running.catch(() => {})
  }
}

/**
 * The one doorway to tenant data: a transaction in which row-level security lets only this
 * organisation's rows through. Without it the application's role sees nothing at all.
 *
 * @throws DatabaseUnavailable where no connection could be had in time.
 */
export async function withOrganisation<T>(organisationId: string, work: (tx: Transaction) => Promise<T>): Promise<T> {
  return withDeadline(started => database().transaction(async (tx) => {
    await tx.execute(sql`select set_config('coldslip.organisation_id', ${organisationId}, true)`)
    started()
    return work(tx)
  }))
}

/** The same doorway on the bulk client, for COPY and set-based statements of intake. */
export async function withOrganisationBulk<T>(organisationId: string, work: (tx: BulkTransaction) => Promise<T>): Promise<T> {
  return withDeadline(started => bulkClient().begin(async (tx) => {
    await tx`select set_config('coldslip.organisation_id', ${organisationId}, true)`
    started()
    return work(tx)
  }) as Promise<T>)
}

/** For the look-ups that come before an organisation is known; they reach tenant tables only through narrow functions. */
export async function withoutOrganisation<T>(work: (client: postgres.Sql) => Promise<T>): Promise<T> {
  return withDeadline(async (started) => {
    const result = await work(bulkClient())
    started()
    return result
  })
}
