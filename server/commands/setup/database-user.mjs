import { spawnSync } from 'node:child_process'
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

/** Whether that user may pass through the folder and everything above it. */
export function userCanEnter(user, folder) {
  return spawnSync('test', ['-x', folder], { ...user, cwd: '/' }).status === 0
}
