import { accessSync, constants, existsSync, mkdirSync, statSync } from 'node:fs'
import { userInfo } from 'node:os'
import { PlainError } from './plain-error.mjs'

/** Makes `.data`, or says why it cannot be used. */
export function ensureDataFolder(folder) {
  try {
    if (!existsSync(folder)) mkdirSync(folder, { mode: 0o755 })
    if (!statSync(folder).isDirectory()) throw new PlainError(`${folder} is a file, but Coldslip keeps its database in a folder of that name; move the file away.`)
    accessSync(folder, constants.R_OK | constants.W_OK | constants.X_OK)
  } catch (error) {
    if (error instanceof PlainError) throw error
    throw new PlainError(`${userInfo().username} may not write in ${folder} (${error.code}); start as its owner, or give it over: sudo chown -R ${userInfo().username} ${folder}`)
  }
}
