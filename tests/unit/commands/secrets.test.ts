import { mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { readSecrets } from '../../../server/commands/setup/secrets.mjs'

let folder = ''
beforeEach(() => { folder = mkdtempSync(join(tmpdir(), 'coldslip-secrets-')) })
afterEach(() => rmSync(folder, { recursive: true }))

describe('readSecrets', () => {
  it('makes three different ones, for the owner of the folder only, and keeps them', () => {
    const made = readSecrets(folder, false)
    expect(new Set(Object.values(made)).size).toBe(3)
    expect(statSync(join(folder, 'secrets.json')).mode & 0o777).toBe(0o600)
    expect(readSecrets(folder, true)).toEqual(made)
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
