import { createHash } from 'node:crypto'
import { chownSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import { basename, dirname, join } from 'node:path'
import { userCanEnter } from './database-user.mjs'
import { say } from './progress.mjs'

const SHARED_HOME = '/var/lib/coldslip'
const NOTE = 'database-is-elsewhere.txt'

/** PostgreSQL's user owns its folder; some mounted file systems allow no other owner. */
function canOwn(user, folder) {
  const trial = join(folder, '.owner-trial')
  try {
    mkdirSync(trial, { recursive: true })
    chownSync(trial, user.uid, user.gid)
    return userCanEnter(user, trial)
  } catch {
    return false
  }
}

/** The folder named by the note in `.data`, unless the note came here with a copy of another clone that still exists. */
function folderOfNote(root, dataFolder) {
  const note = join(dataFolder, NOTE)
  if (!existsSync(note)) return null
  const folder = readFileSync(note, 'utf8').split('\n')[0].trim()
  const home = dirname(folder)
  if (!folder.startsWith(`${SHARED_HOME}/`) || !existsSync(join(home, 'clone'))) return null
  const owner = readFileSync(join(home, 'clone'), 'utf8').trim()
  if (owner !== root && existsSync(owner)) return null
  writeFileSync(join(home, 'clone'), `${root}\n`)
  return folder
}

function folderElsewhere(root, dataFolder) {
  const noted = folderOfNote(root, dataFolder)
  if (noted) return noted
  const home = join(SHARED_HOME, createHash('sha256').update(root).digest('hex').slice(0, 16))
  if (existsSync(home)) {
    // `.data` was removed to begin anew: its password is gone, but the database may still be wanted.
    const aside = `${home}.until-${new Date().toISOString().replace(/[:.]/g, '-')}`
    renameSync(home, aside)
    say(`  The database of an earlier .data was put aside: ${aside}`)
  }
  mkdirSync(home, { recursive: true, mode: 0o755 })
  writeFileSync(join(home, 'clone'), `${root}\n`)
  const folder = join(home, 'postgres')
  writeFileSync(join(dataFolder, NOTE), `${folder}\n\nThe user postgres may not enter ${dataFolder}, so the database of this clone lies in the folder above.\n`)
  return folder
}

/**
 * Where this clone's database lies: `.data/postgres`, or under /var/lib/coldslip when root starts it and
 * the user postgres cannot enter the clone (a home of mode 700). The choice, once made, stays.
 *
 * @param {string} root real path of the clone
 * @param {string} dataFolder
 * @param {{ uid: number, gid: number } | null} user who runs PostgreSQL
 */
export function clusterFolder(root, dataFolder, user) {
  const inside = join(dataFolder, 'postgres')
  if (existsSync(inside) && (user === null || userCanEnter(user, dataFolder))) return inside
  if (user === null) return inside
  if (!existsSync(join(dataFolder, NOTE)) && canOwn(user, dataFolder)) return inside
  return folderElsewhere(root, dataFolder)
}

export function isInside(folder, dataFolder) {
  return dirname(folder) === dataFolder && basename(folder) === 'postgres'
}
