import { existsSync, readdirSync, realpathSync } from 'node:fs'
import { delimiter, dirname, join } from 'node:path'
import { installDebianPackages } from './apt.mjs'
import { PlainError } from './plain-error.mjs'
import { run } from './run.mjs'

/** The oldest PostgreSQL that the tests run against. */
const OLDEST_MAJOR = 15
const PROGRAMS = ['initdb', 'pg_ctl', 'postgres']

function children(folder) {
  try {
    return readdirSync(folder).map(name => join(folder, name))
  } catch {
    return []
  }
}

/** Where distributions put the server's programs; most keep them out of the PATH. */
function candidateFolders() {
  const own = process.env.COLDSLIP_POSTGRES_BIN
  if (own) return [own]
  const path = (process.env.PATH ?? '').split(delimiter).filter(folder => existsSync(join(folder, 'initdb')))
    // A link in the PATH may stand for one program only; the folder it points to has all of them.
    .map(folder => dirname(realpathSync(join(folder, 'initdb'))))
  const versioned = children('/usr/lib/postgresql').map(folder => join(folder, 'bin'))
  const redHat = children('/usr').filter(folder => folder.startsWith('/usr/pgsql-')).map(folder => join(folder, 'bin'))
  const homebrew = ['/opt/homebrew/opt', '/usr/local/opt'].flatMap(children).filter(folder => folder.includes('postgresql')).map(folder => join(folder, 'bin'))
  return [...new Set([...path, ...versioned, ...redHat, ...homebrew, '/usr/local/pgsql/bin'])]
}

/** @returns {Promise<{ folder: string, major: number }[]>} newest first */
async function installedVersions() {
  const found = []
  for (const folder of candidateFolders()) {
    if (!PROGRAMS.every(program => existsSync(join(folder, program)))) continue
    const { output } = await run(join(folder, 'postgres'), ['--version'])
    const major = Number(/PostgreSQL\) (\d+)/.exec(output)?.[1])
    if (major >= OLDEST_MAJOR) found.push({ folder, major })
  }
  return found.sort((a, b) => b.major - a.major)
}

async function debianPackage() {
  const { output } = await run('apt-cache', ['policy', 'postgresql-15'])
  return /Candidate: \d/.test(output) ? 'postgresql-15' : 'postgresql'
}

/**
 * Finds PostgreSQL's programs, and installs them where that is possible.
 *
 * @param {number | null} major the version that made the existing cluster, null for a new one
 */
export async function ensurePostgres(major = null) {
  const fits = version => major === null || version.major === major
  let found = (await installedVersions()).find(fits)
  if (found) return found
  if (process.env.COLDSLIP_POSTGRES_BIN) {
    throw new PlainError(`COLDSLIP_POSTGRES_BIN is ${process.env.COLDSLIP_POSTGRES_BIN}, where no PostgreSQL ${major ?? `${OLDEST_MAJOR} or newer`} is.`)
  }
  if (major === null) {
    await installDebianPackages(`PostgreSQL ${OLDEST_MAJOR} or newer`, [await debianPackage()])
  } else {
    await installDebianPackages(`PostgreSQL ${major}, which made the database in .data,`, [`postgresql-${major}`])
  }
  found = (await installedVersions()).find(fits)
  if (!found) throw new PlainError('PostgreSQL was installed, but its initdb was not found; name its folder in COLDSLIP_POSTGRES_BIN.')
  return found
}
