import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { PROBLEMS } from '#shared/contract/problems'
import { REFUSALS } from '#shared/intake/refusal'

const server = fileURLToPath(new URL('../../../server', import.meta.url))

describe('the codes of problems', () => {
  it('that the server answers with are all explained on the documentation page', () => {
    const used = readdirSync(server, { recursive: true, encoding: 'utf8' }).filter(file => file.endsWith('.ts'))
      .flatMap(file => [...readFileSync(join(server, file), 'utf8').matchAll(/new (?:Problem|IntakeRefused)\(\s*\d+(?: \| \d+)*, '([a-z-]+)'/g)].map(match => match[1]!))
    expect(used.length).toBeGreaterThan(15)
    const explained = new Set<string>([...PROBLEMS.map(problem => problem.code), ...Object.keys(REFUSALS)])
    expect(used.filter(code => !explained.has(code))).toEqual([])
  })
})
