import { createHash, randomBytes } from 'node:crypto'
import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import postgres from 'postgres'
import { migrateDatabase } from '#server/database/migrate'

const DATABASE_CODE = fileURLToPath(new URL('../../server/database', import.meta.url))
const MIGRATIONS = join(DATABASE_CODE, 'migrations')

/** The application's role belongs to the whole cluster, so every database of a run uses this password. */
export const APPLICATION_PASSWORD = process.env.TEST_APPLICATION_PASSWORD ?? 'coldslip-tests-only'

export interface TestDatabase {
  name: string
  /** The role that may create and alter tables. */
  ownerUrl: string
  /** The role that the server uses: it owns nothing. */
  appUrl: string
  drop: () => Promise<void>
}

function clusterUrl(): URL {
  const url = process.env.TEST_CLUSTER_URL
  if (!url) throw new Error('TEST_CLUSTER_URL is not set: run `npm test -- database`, which starts a throw-away cluster, or name a superuser connection.')
  return new URL(url)
}

function urlOf(database: string, role?: { name: string, password: string }): string {
  const url = clusterUrl()
  url.pathname = `/${database}`
  if (role) {
    url.username = role.name
    url.password = role.password
  }
  return url.toString()
}

/** A cluster that outlives one run must not hand out yesterday's tables: the template's name carries a digest of what made it. */
function templateName(): string {
  const digest = createHash('sha256')
  for (const name of readdirSync(DATABASE_CODE, { recursive: true, encoding: 'utf8' }).sort()) {
    const file = join(DATABASE_CODE, name)
    if (statSync(file).isFile()) digest.update(`${name}\0`).update(readFileSync(file))
  }
  return `coldslip_template_${digest.digest('hex').slice(0, 12)}`
}

async function asSuperuser<T>(work: (sql: postgres.Sql) => Promise<T>): Promise<T> {
  const sql = postgres(urlOf('postgres'), { max: 1, onnotice: () => {} })
  try {
    return await work(sql)
  } finally {
    await sql.end({ timeout: 5 })
  }
}

/** Test files run in parallel: the first one migrates, the others wait for it at the lock. */
async function ensureTemplate(sql: postgres.Sql): Promise<string> {
  const name = templateName()
  await sql`select pg_advisory_lock(hashtext('coldslip test template'))`
  try {
    const ready = await sql`select 1 from pg_database where datname = ${name} and datistemplate`
    if (ready.length === 0) {
      // One that is no template yet was left half migrated.
      await sql.unsafe(`drop database if exists "${name}" with (force)`)
      await sql.unsafe(`create database "${name}"`)
      await migrateDatabase({ ownerUrl: urlOf(name), folder: MIGRATIONS, appRolePassword: APPLICATION_PASSWORD })
      await sql.unsafe(`alter database "${name}" with is_template true allow_connections false`)
    }
  } finally {
    await sql`select pg_advisory_unlock(hashtext('coldslip test template'))`
  }
  return name
}

/** An empty database with all tables, roles and queues, in a fraction of a second; call `drop` when done. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `coldslip_test_${randomBytes(6).toString('hex')}`
  await asSuperuser(async (sql) => {
    const template = await ensureTemplate(sql)
    await sql.unsafe(`create database "${name}" template "${template}"`)
    // Rights on a database, unlike those inside it, are not copied.
    await sql.unsafe(`grant connect, temporary on database "${name}" to coldslip_app`)
  })
  return {
    name,
    ownerUrl: urlOf(name),
    appUrl: urlOf(name, { name: 'coldslip_app', password: APPLICATION_PASSWORD }),
    drop: () => asSuperuser(async (sql) => {
      await sql.unsafe(`drop database if exists "${name}" with (force)`)
    }),
  }
}
