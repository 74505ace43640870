import { createPrivateKey } from 'node:crypto'
import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { readSecrets } from '../../../server/commands/setup/secrets.mjs'

let folder = ''
beforeEach(() => { folder = mkdtempSync(join(tmpdir(), 'coldslip-secrets-')) })
afterEach(() => rmSync(folder, { recursive: true }))

describe('readSecrets', () => {
  it('makes different ones, for the owner of the folder only, and keeps them', () => {
    const made = readSecrets(folder, false)
    expect(new Set(Object.values(made)).size).toBe(4)
    expect(createPrivateKey({ key: Buffer.from(made.signingKey, 'base64'), format: 'der', type: 'pkcs8' }).asymmetricKeyType).toBe('ed25519')
    expect(statSync(join(folder, 'secrets.json')).mode & 0o777).toBe(0o600)
    expect(readSecrets(folder, true)).toEqual(made)
  })

  it('adds the signing key to a file from before there was one, and leaves the passwords', () => {
    const { signingKey: _key, ...before } = readSecrets(folder, false)
    writeFileSync(join(folder, 'secrets.json'), JSON.stringify(before))
    const after = readSecrets(folder, true)
    expect(after).toMatchObject(before)
    expect(after.signingKey.length).toBeGreaterThan(60)
    expect(readSecrets(folder, true)).toEqual(after)
  })

  it('does not replace a damaged file, which would lock the owner out', () => {
    for (const text of ['', '{"databasePassword":', '{}', 'null']) {
      writeFileSync(join(folder, 'secrets.json'), text)
      expect(() => readSecrets(folder, true)).toThrow('is damaged; restore it from a backup')
    }
  })

  it('says that the file is missing where a database exists', () => {
    expect(() => readSecrets(folder, true)).toThrow('is missing, and without it nobody can sign in')
  })
})
