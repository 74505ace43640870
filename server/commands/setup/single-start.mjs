import { existsSync, readFileSync, realpathSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PlainError } from './plain-error.mjs'

/** Whether that process is a start command of this clone, and not another program with a number used again. */
function isStartOf(pid, root) {
  if (pid === process.pid) return false
  try {
    process.kill(pid, 0)
  } catch (error) {
    if (error.code !== 'EPERM') return false
  }
  if (!existsSync('/proc/self/cmdline')) return true
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('start.mjs') && realpathSync(`/proc/${pid}/cwd`) === root
  } catch (error) {
    // Another user's process may not be looked into.
    return error.code === 'EACCES'
  }
}

/** Two starts of one clone would fight for one database folder. */
export function claimStart(root, dataFolder) {
  const file = join(dataFolder, 'start.pid')
  if (existsSync(file)) {
    const pid = Number(readFileSync(file, 'utf8'))
    if (pid > 0 && isStartOf(pid, root)) throw new PlainError(`Coldslip already runs from this folder (process ${pid}); stop it first with Ctrl-C in its terminal, or: kill ${pid}`)
  }
  writeFileSync(file, String(process.pid))
  return () => rmSync(file, { force: true })
}
