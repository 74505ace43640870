import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { STATISTICS_ADAPTERS } from '#fixtures/checks/adapters/statistics'

interface Tolerance { type: 'relative' | 'absolute', value: number }
interface Case { id: string, method: string, what: string, inputs: unknown, expected: Record<string, unknown>, tolerance: Tolerance, source: string }

const cases = JSON.parse(readFileSync(new URL('../../../fixtures/checks/statistics.json', import.meta.url), 'utf8')) as Case[]

/** Every place at which the found figure is off by more than the tolerance. */
function disagreements(expected: unknown, found: unknown, tolerance: Tolerance, path: string): string[] {
  if (Array.isArray(expected)) {
    if (!Array.isArray(found) || found.length !== expected.length) return [`${path}: ${JSON.stringify(found)} has another length`]
    return expected.flatMap((value, i) => disagreements(value, found[i], tolerance, `${path}[${i}]`))
  }
  if (typeof expected !== 'number') return found === expected ? [] : [`${path}: expected ${String(expected)}, found ${String(found)}`]
  // Where 0 is expected a relative tolerance has nothing to refer to.
  const allowed = tolerance.type === 'relative' && expected !== 0 ? tolerance.value * Math.abs(expected) : tolerance.value
  const agrees = typeof found === 'number' && Math.abs(found - expected) <= allowed
  return agrees ? [] : [`${path}: expected ${expected}, found ${String(found)}`]
}

describe('published statistics cases', () => {
  it('are all there, each with a public source', () => {
    expect(cases.length).toBeGreaterThanOrEqual(94)
    expect(new Set(cases.map(({ id }) => id)).size).toBe(cases.length)
    for (const { source, expected } of cases) {
      expect(source.length).toBeGreaterThan(3)
      expect(Object.keys(expected).length).toBeGreaterThan(0)
    }
  })

  it.each(cases.map(entry => [entry.id, entry] as const))('%s', (_, entry) => {
    const found = STATISTICS_ADAPTERS[entry.method]!(entry.inputs)
    const off = Object.entries(entry.expected).flatMap(([name, value]) => disagreements(value, found[name], entry.tolerance, name))
    expect(off).toEqual([])
  })
})
