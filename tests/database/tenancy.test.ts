import postgres from 'postgres'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createTestDatabase, type TestDatabase } from '../support/cluster'

let database: TestDatabase
let owner: postgres.Sql
let app: postgres.Sql
const A = '019b0000-0000-7000-8000-00000000000a'
const B = '019b0000-0000-7000-8000-00000000000b'

beforeAll(async () => {
  database = await createTestDatabase()
  owner = postgres(database.ownerUrl, { max: 2, onnotice: () => {} })
  app = postgres(database.appUrl, { max: 2, onnotice: () => {} })
})
afterAll(async () => {
  await Promise.all([owner.end(), app.end()])
  await database.drop()
})

const tenantTables = () => owner<{ name: string, partition: boolean }[]>`
  select c.relname as name, c.relispartition as partition from pg_class c join pg_attribute a on a.attrelid = c.oid
  where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'p') and a.attname = 'organisation_id' and not a.attisdropped order by 1`

describe('row-level security, from the catalogue', () => {
  it('is enabled and forced on every table that carries an organisation', async () => {
    const open = await owner`
      select relname from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p') and not (relrowsecurity and relforcerowsecurity)`
    expect(open).toEqual([])
  })

  it('every table carries the organisation', async () => {
    const all = await owner`select relname from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p')`
    expect((await tenantTables()).length).toBe(all.length)
  })

  it('has a policy with both clauses on every such table but the partitions, which the application may not touch', async () => {
    for (const { name, partition } of await tenantTables()) {
      const policies = await owner`select polcmd, polqual is not null as reads, polwithcheck is not null as writes from pg_policy where polrelid = ${name}::regclass and polname = 'organisation_scope'`
      const [rights] = await owner`select has_table_privilege('coldslip_app', ${name}, 'SELECT') as read, has_table_privilege('coldslip_app', ${name}, 'TRUNCATE') or has_table_privilege('coldslip_app', ${name}, 'REFERENCES') as much`
      expect(rights!.much, name).toBe(false)
      if (partition) expect(rights!.read, name).toBe(false)
      else expect(policies, name).toEqual([{ polcmd: '*', reads: true, writes: true }])
    }
  })

  it('every unique key and foreign key carries the organisation, but those that find a stranger', async () => {
    const keys = await owner<{ name: string, columns: string[] }[]>`
      select i.indexrelid::regclass::text as name, array_agg(a.attname order by a.attnum) as columns
      from pg_index i join pg_class c on c.oid = i.indrelid join pg_attribute a on a.attrelid = i.indrelid and a.attnum = any(i.indkey)
      where i.indisunique and c.relnamespace = 'public'::regnamespace group by 1`
    const strangers = new Set(['people_email_key', 'sessions_digest_key', 'device_tokens_lookup_key', 'certificates_code_key'])
    for (const { name, columns } of keys) if (!strangers.has(name)) expect(columns, name).toContain('organisation_id')
    const foreign = await owner<{ name: string, columns: string[] }[]>`
      select k.conname as name, array_agg(a.attname) as columns from pg_constraint k join pg_attribute a on a.attrelid = k.conrelid and a.attnum = any(k.conkey)
      where k.contype = 'f' and k.connamespace = 'public'::regnamespace group by 1`
    expect(foreign.length).toBeGreaterThan(5)
    for (const { name, columns } of foreign) expect(columns, name).toContain('organisation_id')
  })

  it('the application\'s role owns nothing, bypasses nothing, and no view shows more', async () => {
    const [role] = await owner`select rolsuper, rolbypassrls, rolcreaterole, rolcreatedb from pg_roles where rolname = 'coldslip_app'`
    expect(role).toEqual({ rolsuper: false, rolbypassrls: false, rolcreaterole: false, rolcreatedb: false })
    expect(await owner`select 1 from pg_class where relowner = 'coldslip_app'::regrole`).toHaveLength(0)
    expect(await owner`select 1 from pg_class where relnamespace = 'public'::regnamespace and relkind in ('v', 'm')`).toHaveLength(0)
  })

  it('what must not change has no right to be changed', async () => {
    for (const table of ['audit_events', 'limit_sets', 'submission_chunks', 'reading_identities', 'reading_revisions', 'refused_rows']) {
      const [rights] = await owner`select has_table_privilege('coldslip_app', ${table}, 'UPDATE') as change, has_table_privilege('coldslip_app', ${table}, 'DELETE') as remove`
      expect(rights, table).toEqual({ change: false, remove: false })
    }
    const [readings] = await owner`select has_table_privilege('coldslip_app', 'readings', 'DELETE') as remove`
    expect(readings!.remove).toBe(false)
  })
})

describe('row-level security, tried', () => {
  beforeAll(async () => {
    for (const id of [A, B]) {
      await owner`insert into organisations (organisation_id, name) values (${id}, 'Same name')`
      await owner`insert into shops (organisation_id, id, name, time_zone) values (${id}, '019b0000-0000-7000-8000-000000000001', 'Same shop', 'UTC')`
    }
  })

  it('without an organisation no row is seen and none is written', async () => {
    for (const { name, partition } of await tenantTables()) {
      if (partition) continue
      expect(await app`select 1 from ${app(name)} limit 1`, name).toHaveLength(0)
    }
    await expect(app`insert into organisations (organisation_id, name) values (${'019b0000-0000-7000-8000-00000000000c'}, 'x')`).rejects.toThrow(/row-level security/)
  })

  it('with one, only its own rows are seen, changed and written, even where ids are equal', async () => {
    await app.begin(async (tx) => {
      await tx`select set_config('coldslip.organisation_id', ${A}, true)`
      expect(await tx`select organisation_id from shops`).toEqual([{ organisation_id: A }])
      expect((await tx`update shops set name = 'mine'`).count).toBe(1)
    })
    expect((await owner`select name from shops where organisation_id = ${B}`)[0]!.name).toBe('Same shop')
    await expect(app.begin(async (tx) => {
      await tx`select set_config('coldslip.organisation_id', ${A}, true)`
      await tx`insert into shops (organisation_id, id, name, time_zone) values (${B}, '019b0000-0000-7000-8000-000000000002', 'theirs', 'UTC')`
    })).rejects.toThrow(/row-level security/)
  })

  it('the organisation of one transaction is gone in the next on the same connection', async () => {
    const one = postgres(database.appUrl, { max: 1 })
    await one.begin(async (tx) => {
      await tx`select set_config('coldslip.organisation_id', ${A}, true)`
      expect(await tx`select 1 from shops`).toHaveLength(1)
    })
    expect(await one`select 1 from shops`).toHaveLength(0)
    await one.end()
  })
})

describe('partitions', () => {
  it('are made on demand by the application, which may not make tables, and once only', async () => {
    await Promise.all(Array.from({ length: 8 }, () => app`select ensure_reading_partition('2019-05-17')`))
    expect(await owner`select 1 from pg_inherits where inhparent = 'readings'::regclass and inhrelid = 'readings_2019_05'::regclass`).toHaveLength(1)
    await expect(app`create table mine (x int)`).rejects.toThrow(/permission denied/)
    await expect(app`select ensure_reading_partition('1800-01-01')`).rejects.toThrow(/no partition/)
  })

  it('carry all indexes of the whole, and a list is read from the newest backwards without a sort', async () => {
    const [indexes] = await owner`select count(*)::int as n from pg_index where indrelid = 'readings_2019_05'::regclass`
    const [whole] = await owner`select count(*)::int as n from pg_index where indrelid = 'readings'::regclass`
    expect(indexes!.n).toBe(whole!.n)
    const plan = await app.begin(async (tx) => {
      await tx`select set_config('coldslip.organisation_id', ${A}, true)`
      await tx`set local enable_seqscan = off`
      return tx`explain select * from readings where organisation_id = ${A} order by sampled_at desc, id desc limit 50`
    })
    const text = plan.map(row => row['QUERY PLAN']).join('\n')
    expect(text).toContain('Index Scan Backward')
    expect(text).not.toContain('Sort')
  })
})
