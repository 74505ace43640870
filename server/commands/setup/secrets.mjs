import { generateKeyPairSync, randomBytes } from 'node:crypto'
import { existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PlainError } from './plain-error.mjs'

const NAMES = ['databasePassword', 'applicationPassword', 'sessionPassword']

/** A new Ed25519 private key (PKCS #8, base64). */
const newSigningKey = () => generateKeyPairSync('ed25519').privateKey.export({ format: 'der', type: 'pkcs8' }).toString('base64')

/**
 * Passwords and signing key of this installation, made once and kept in `.data/secrets.json` (mode 600).
 *
 * @param {string} dataFolder
 * @param {boolean} databaseExists new passwords would lock its owner out of it
 * @returns {{ databasePassword: string, applicationPassword: string, sessionPassword: string, signingKey: string }}
 */
export function readSecrets(dataFolder, databaseExists) {
  const file = join(dataFolder, 'secrets.json')
  if (existsSync(file)) {
    try {
      const secrets = JSON.parse(readFileSync(file, 'utf8'))
      if (NAMES.every(name => typeof secrets[name] === 'string' && secrets[name].length >= 32)) {
        // Installations made before certificates were signed have no key yet.
        return secrets.signingKey ? secrets : write(file, { ...secrets, signingKey: newSigningKey() })
      }
    } catch {
      // Said below, for a file that cannot be parsed and one that lacks a password alike.
    }
    throw new PlainError(`${file} is damaged; restore it from a backup, or move the folder ${dataFolder} away to begin with an empty database.`)
  }
  if (databaseExists) throw new PlainError(`${file} is missing, and without it nobody can sign in to the database; restore it from a backup, or move the folder ${dataFolder} away to begin with an empty database.`)
  return write(file, { ...Object.fromEntries(NAMES.map(name => [name, randomBytes(32).toString('hex')])), signingKey: newSigningKey() })
}

/** Written beside and renamed, so that a start cut off here leaves no half file. */
function write(file, secrets) {
  writeFileSync(`${file}.new`, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 })
  renameSync(`${file}.new`, file)
  return secrets
}
