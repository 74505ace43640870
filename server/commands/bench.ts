import { mkdtempSync, chownSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { randomBytes } from 'node:crypto'
import { fileURLToPath } from 'node:url'
import { migrateDatabase } from '#server/database/migrate'
import { createCluster, ensureDatabase, ownerUrl, startCluster, stopCluster } from './setup/cluster.mjs'
import { databaseUser } from './setup/database-user.mjs'
import { ensurePostgres } from './setup/postgres-binaries.mjs'

// `npm run bench -- NAME`: measures as ratios against a yardstick in the same run, on a cluster of its own that flushes to disk.
const BENCHES = {
  ingest: () => import('./bench/ingest'),
  http: () => import('./bench/http'),
}

const name = process.argv[2] as keyof typeof BENCHES
if (!(name in BENCHES)) {
  console.error(`Say which: npm run bench -- ${Object.keys(BENCHES).join(' | ')}`)
  process.exit(2)
}

const user = databaseUser()
const home = mkdtempSync('/var/tmp/coldslip-bench-')
if (user) chownSync(home, user.uid, user.gid)
const cluster = { folder: join(home, 'postgres'), bin: (await ensurePostgres()).folder, user }
try {
  const password = randomBytes(12).toString('hex')
  await createCluster(cluster, password, { durable: true })
  const port = await startCluster(cluster, { settings: { shared_buffers: '1GB', max_wal_size: '8GB' } })
  await ensureDatabase(port, password, 'bench')
  const owner = ownerUrl(port, password, 'bench')
  const { applicationUrl } = await migrateDatabase({ ownerUrl: owner, folder: fileURLToPath(new URL('../database/migrations', import.meta.url)), appRolePassword: randomBytes(12).toString('hex') })
  process.env.DATABASE_URL = applicationUrl
  const { run } = await BENCHES[name]()
  await run({ ownerUrl: owner, applicationUrl })
} finally {
  await stopCluster(cluster, 'immediate')
  rmSync(home, { recursive: true, force: true })
}
process.exit(0)
