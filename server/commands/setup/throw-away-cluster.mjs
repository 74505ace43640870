import { chownSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { randomBytes } from 'node:crypto'
import { createCluster, ownerUrl, startCluster, stopCluster } from './cluster.mjs'
import { databaseUser, userCanEnter } from './database-user.mjs'

/** A temporary folder that PostgreSQL's user can enter, wherever TMPDIR points. */
function temporaryFolder(user) {
  for (const parent of [tmpdir(), '/var/tmp', '/tmp']) {
    const folder = mkdtempSync(join(parent, 'coldslip-cluster-'))
    if (user === null) return folder
    chownSync(folder, user.uid, user.gid)
    if (userCanEnter(user, folder)) return folder
    rmSync(folder, { recursive: true })
  }
  return mkdtempSync('/tmp/coldslip-cluster-')
}

/**
 * A cluster for one test run. It does not flush to disk: the tests kill processes, never the machine.
 *
 * @param {string} bin folder with PostgreSQL's programs
 * @returns {Promise<{ url: string, remove: () => Promise<void> }>} url: a superuser's connection
 */
export async function throwAwayCluster(bin) {
  const user = databaseUser()
  const home = temporaryFolder(user)
  const cluster = { folder: join(home, 'postgres'), bin, user }
  const remove = async () => {
    await stopCluster(cluster, 'immediate')
    rmSync(home, { recursive: true, force: true })
  }
  try {
    const password = randomBytes(16).toString('hex')
    await createCluster(cluster, password, { durable: false })
    const port = await startCluster(cluster, { settings: { fsync: 'off', full_page_writes: 'off', max_connections: '200' } })
    return { url: ownerUrl(port, password, 'postgres'), remove }
  } catch (error) {
    rmSync(home, { recursive: true, force: true })
    throw error
  }
}
