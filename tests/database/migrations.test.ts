import { execFile } from 'node:child_process'
import { readFile } from 'node:fs/promises'
import { promisify } from 'node:util'
import { fileURLToPath } from 'node:url'
import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { migrateDatabase } from '#server/database/migrate'
import { QUEUES } from '#server/database/queue/definitions'
import { APPLICATION_PASSWORD } from '../support/cluster'

const folder = fileURLToPath(new URL('../../server/database/migrations', import.meta.url))
const root = fileURLToPath(new URL('../..', import.meta.url))
let cluster: postgres.Sql
const name = `coldslip_migrate_${process.pid}`
const ownerUrl = () => Object.assign(new URL(process.env.TEST_CLUSTER_URL!), { pathname: `/${name}` }).toString()

beforeAll(async () => {
  cluster = postgres(process.env.TEST_CLUSTER_URL!, { max: 1, onnotice: () => {} })
  await cluster.unsafe(`create database ${name}`)
})
afterAll(async () => {
  await cluster.unsafe(`drop database if exists ${name} with (force)`)
  await cluster.end()
})

describe('migrations', () => {
  it('run by five at once on an empty database, and again, come out the same', async () => {
    const run = () => migrateDatabase({ ownerUrl: ownerUrl(), folder, appRolePassword: APPLICATION_PASSWORD })
    await Promise.all(Array.from({ length: 5 }, run))
    await run()
    const sql = postgres(ownerUrl(), { max: 1 })
    const { entries } = JSON.parse(await readFile(`${folder}/meta/_journal.json`, 'utf8'))
    expect((await sql`select count(*)::int as n from drizzle.__drizzle_migrations`)[0]!.n).toBe(entries.length)
    expect((await sql`select name from pgboss.queue`).map(row => row.name)).toEqual(expect.arrayContaining(Object.keys(QUEUES)))
    await sql.end()
  })

  it('say what the schema files say: nothing is left to generate', async () => {
    const { stdout } = await promisify(execFile)(process.execPath, ['node_modules/drizzle-kit/bin.cjs', 'generate'], { cwd: root })
    expect(stdout).toContain('No schema changes')
    expect((await promisify(execFile)('git', ['status', '--porcelain', 'server/database/migrations'], { cwd: root })).stdout.split('\n').filter(line => line.startsWith('??'))).toEqual([])
  })
})
