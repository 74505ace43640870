import { spawnSync } from 'node:child_process'
import { statSync } from 'node:fs'
import { PlainError } from './plain-error.mjs'

function idOf(option) {
  const { status, stdout } = spawnSync('id', [option, 'postgres'], { encoding: 'utf8' })
  return status === 0 ? Number(stdout) : null
}

/**
 * PostgreSQL refuses to run as root. As root it runs as the `postgres` user that its package made,
 * otherwise as whoever started the command.
 *
 * @returns {{ uid: number, gid: number } | null} null: no change of user
 */
export function databaseUser() {
  if (process.getuid() !== 0) return null
  const uid = idOf('-u')
  const gid = idOf('-g')
  if (uid === null || gid === null) throw new PlainError('PostgreSQL refuses to run as root and there is no user named postgres; make one (useradd --system postgres), or start as an ordinary user.')
  return { uid, gid }
}

/** An existing database runs as the owner of its folder, whoever that was at first. */
export function ownerOf(folder) {
  const { uid, gid } = statSync(folder)
  const me = process.getuid()
  if (me === uid && me !== 0) return null
  if (me !== 0) throw new PlainError(`The database in ${folder} belongs to another user (number ${uid}); start as that user, or as root.`)
  if (uid === 0) throw new PlainError(`The database folder ${folder} belongs to root, as whom PostgreSQL refuses to run; give it back to its owner (chown -R postgres ${folder}).`)
  return { uid, gid }
}

/** Whether that user may pass through the folder and everything above it. */
export function userCanEnter(user, folder) {
  return spawnSync('test', ['-x', folder], { ...user, cwd: '/' }).status === 0
}
