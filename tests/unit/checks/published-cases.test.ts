import { describe, expect, it } from 'vitest'
import { publishedCases } from '#fixtures/checks/published'

const cases = publishedCases()

describe('published cases', () => {
  it('are all there, each once and with a public source', () => {
    const byFile = new Map<string, number>()
    for (const { file } of cases) byFile.set(file, (byFile.get(file) ?? 0) + 1)
    expect(Object.fromEntries(byFile)).toEqual({ limits: 71, properties: 138, decision: 19, statistics: 94 })
    expect(new Set(cases.map(entry => `${entry.file} ${entry.id}`)).size).toBe(cases.length)
    for (const { source } of cases) expect(source.length).toBeGreaterThan(3)
  })

  it.each(cases.map(entry => [`${entry.file} ${entry.id}`, entry] as const))('%s', (_, entry) => {
    expect(entry.check().off).toEqual([])
  })
})
