import { createHash } from 'node:crypto'
import { chownSync, existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { databaseUser, ownerOf, userCanEnter } from './database-user.mjs'
import { PlainError } from './plain-error.mjs'
import { say } from './progress.mjs'

const SHARED_HOME = '/var/lib/coldslip'
const NOTE = 'database-is-elsewhere.txt'

/** PostgreSQL's user must own its folder; some mounted file systems allow no other owner. */
function canLiveIn(user, dataFolder) {
  const trial = join(dataFolder, '.owner-trial')
  try {
    mkdirSync(trial)
    chownSync(trial, user.uid, user.gid)
    return userCanEnter(user, trial)
  } catch {
    return false
  } finally {
    rmSync(trial, { recursive: true, force: true })
  }
}

/** The folder that the note in `.data` names, unless the note came here in a copy of another clone that still exists. */
function folderOfNote(root, dataFolder) {
  const note = join(dataFolder, NOTE)
  if (!existsSync(note)) return null
  const folder = readFileSync(note, 'utf8').split('\n')[0].trim()
  const cloneFile = join(dirname(folder), 'clone')
  if (!folder.startsWith(`${SHARED_HOME}/`) || !existsSync(cloneFile)) {
    throw new PlainError(`${note} says that the database lies in ${folder}, but nothing is there; bring it back, or move the folder ${dataFolder} away to begin with an empty database.`)
  }
  const clone = readFileSync(cloneFile, 'utf8').trim()
  if (clone !== root && existsSync(clone)) {
    throw new PlainError(`${dataFolder} was copied from ${clone}, whose database it would share; remove this copy's .data to begin with an empty database.`)
  }
  writeFileSync(cloneFile, `${root}\n`)
  return folder
}

function newFolderElsewhere(root, dataFolder) {
  const home = join(SHARED_HOME, createHash('sha256').update(root).digest('hex').slice(0, 16))
  if (existsSync(home)) {
    // `.data` was removed to begin anew: its passwords are gone, but somebody may still want the database.
    const aside = `${home}.until-${new Date().toISOString().replace(/[:.]/g, '-')}`
    renameSync(home, aside)
    say(`  The database of an earlier .data was put aside in ${aside}`)
  }
  mkdirSync(home, { recursive: true })
  writeFileSync(join(home, 'clone'), `${root}\n`)
  const folder = join(home, 'postgres')
  writeFileSync(join(dataFolder, NOTE), `${folder}\n\nThe user postgres cannot keep a database in ${dataFolder}, so it lies in the folder named above.\n`)
  return folder
}

/**
 * Where this clone's database lies: `.data/postgres`, or under /var/lib/coldslip when root starts it and
 * the user postgres cannot enter the clone (a home of mode 700). The choice, once made, stays.
 *
 * @param {string} root real path of the clone
 * @param {string} dataFolder
 * @returns {{ folder: string, exists: boolean, user: { uid: number, gid: number } | null }} user: who runs PostgreSQL
 */
export function locateCluster(root, dataFolder) {
  const inside = join(dataFolder, 'postgres')
  const noted = existsSync(inside) ? inside : folderOfNote(root, dataFolder)
  if (noted && existsSync(noted)) {
    if (!existsSync(join(noted, 'PG_VERSION'))) throw new PlainError(`${noted} is not a whole database (it has no PG_VERSION); restore it from a backup, or move the folder ${dataFolder} away to begin with an empty database.`)
    const user = ownerOf(noted)
    if (user && !userCanEnter(user, noted)) throw new PlainError(`The owner of the database cannot enter ${noted} any more; give back the right to pass through the folders above it (chmod o+x).`)
    return { folder: noted, exists: true, user }
  }
  const user = databaseUser()
  if (noted) return { folder: noted, exists: false, user }
  const folder = user === null || canLiveIn(user, dataFolder) ? inside : newFolderElsewhere(root, dataFolder)
  return { folder, exists: false, user }
}
