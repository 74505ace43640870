import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { drizzle } from 'drizzle-orm/postgres-js'
import { migrate as applyMigrations } from 'drizzle-orm/postgres-js/migrator'
import PgBoss from 'pg-boss'
import postgres from 'postgres'
import { QUEUES } from './queue/definitions'

export interface MigrateOptions {
  /** Connection of a role that may create tables, roles and functions; never the application's. */
  ownerUrl: string
  /** Folder with the SQL files and `meta/_journal.json`. */
  folder: string
  /** Password that the application's role gets. */
  appRolePassword: string
}

interface Journal { entries: { when: number, tag: string }[] }

/** The ORM's migrator picks files by a high-water mark of time, so an older file is skipped in silence: refuse such a journal. */
async function readJournal(folder: string): Promise<Journal> {
  const journal = JSON.parse(await readFile(join(folder, 'meta/_journal.json'), 'utf8')) as Journal
  journal.entries.forEach((entry, i) => {
    const before = journal.entries[i - 1]
    if (before && entry.when <= before.when) throw new Error(`Migration ${entry.tag} is dated before ${before.tag}; give it a later time in the journal.`)
  })
  return journal
}

async function checkApplied(sql: postgres.Sql, journal: Journal, folder: string): Promise<void> {
  const applied = await sql<{ hash: string }[]>`select hash from drizzle.__drizzle_migrations order by created_at`
  if (applied.length !== journal.entries.length) throw new Error(`${applied.length} migrations are applied but ${journal.entries.length} are in the journal.`)
  for (const [i, entry] of journal.entries.entries()) {
    const digest = createHash('sha256').update(await readFile(join(folder, `${entry.tag}.sql`), 'utf8')).digest('hex')
    if (applied[i]!.hash !== digest) throw new Error(`Migration ${entry.tag} was edited after it was applied; write a new one instead.`)
  }
}

/** Queues are made by the owner, one after another (two at once deadlock), and their options brought up to date. */
async function prepareQueues(ownerUrl: string): Promise<void> {
  const boss = new PgBoss({ connectionString: ownerUrl, max: 2 })
  const faults: Error[] = []
  boss.on('error', error => faults.push(error))
  await boss.start()
  const names = (Object.keys(QUEUES) as (keyof typeof QUEUES)[]).sort((a, b) => Number('deadLetter' in QUEUES[a].options) - Number('deadLetter' in QUEUES[b].options))
  for (const name of names) {
    const options = { name, ...QUEUES[name].options }
    await boss.createQueue(name, options)
    await boss.updateQueue(name, options)
  }
  await boss.schedule('partitions-ahead', '17 3 * * *')
  await boss.stop({ graceful: false })
  if (faults[0]) throw faults[0]
}

/**
 * Brings a database up to date: tables, roles, policies, queues. Safe to run by several at once (one
 * advisory lock) and again and again.
 *
 * @throws Error naming the statement's cause where SQL fails.
 */
export async function migrateDatabase({ ownerUrl, folder, appRolePassword }: MigrateOptions): Promise<{ applicationUrl: string }> {
  const sql = postgres(ownerUrl, { max: 1, onnotice: () => {} })
  try {
    await sql`select pg_advisory_lock(hashtext('coldslip migrate'))`
    const journal = await readJournal(folder)
    await applyMigrations(drizzle(sql), { migrationsFolder: folder })
    await checkApplied(sql, journal, folder)
    await prepareQueues(ownerUrl)
    // DDL takes no parameters; format() quotes both.
    const [statement] = await sql<{ text: string }[]>`select format('alter role coldslip_app login password %L', ${appRolePassword}::text) as text`
    await withRoleRetry(() => sql.unsafe(statement!.text))
    const [name] = await sql<{ text: string }[]>`select format('grant connect, temporary on database %I to coldslip_app', current_database()) as text`
    await sql.unsafe(name!.text)
    await sql.unsafe(`
      grant usage on schema pgboss to coldslip_app;
      grant select, insert, update, delete on all tables in schema pgboss to coldslip_app;
      grant execute on all functions in schema pgboss to coldslip_app`)
    await sql`select pg_advisory_unlock(hashtext('coldslip migrate'))`
  } finally {
    await sql.end({ timeout: 5 })
  }
  const url = new URL(ownerUrl)
  url.username = 'coldslip_app'
  url.password = encodeURIComponent(appRolePassword)
  return { applicationUrl: url.toString() }
}

/** A role belongs to the cluster: another database's migration may be changing the same catalogue row. */
async function withRoleRetry(run: () => Promise<unknown>): Promise<void> {
  for (let tries = 0; ; tries++) {
    try {
      await run()
      return
    } catch (error) {
      if (tries >= 20 || !String(error).includes('concurrently updated')) throw error
    }
  }
}
