import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { sourceDigest } from '../../../server/commands/setup/build.mjs'

let root = ''

function write(path: string, text: string): void {
  mkdirSync(dirname(join(root, path)), { recursive: true })
  writeFileSync(join(root, path), text)
}

beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'coldslip-digest-'))
  write('app/app.vue', '<template />')
  write('server/api/health.get.ts', 'export default 1')
  write('nuxt.config.ts', 'export default {}')
})

afterEach(() => rmSync(root, { recursive: true }))

describe('sourceDigest', () => {
  it('changes with the content, the name and the presence of a source', () => {
    const digests = [sourceDigest(root)]
    write('app/app.vue', '<template><br></template>')
    digests.push(sourceDigest(root))
    write('shared/new.ts', '')
    digests.push(sourceDigest(root))
    rmSync(join(root, 'shared/new.ts'))
    write('shared/renamed.ts', '')
    digests.push(sourceDigest(root))
    expect(new Set(digests).size).toBe(digests.length)
  })

  it('does not change with what the build does not read', () => {
    const before = sourceDigest(root)
    write('README.md', 'words')
    write('tests/unit/x.test.ts', '')
    write('server/commands/start.mjs', '')
    write('server/database/migrations/0009_x.sql', '')
    expect(sourceDigest(root)).toBe(before)
  })
})
