import Ajv2020 from 'ajv/dist/2020.js'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { purityReadingJsonSchema } from '#shared/contract/reading-json-schema'
import { REFINEMENTS } from '#shared/contract/refinements'
import { validateRecord } from '#shared/intake/validate-record'
import { SUBSTANCES } from '#shared/refrigerants/designations'
import { anyReading } from '../intake/arbitraries'

const accepts = new Ajv2020({ strict: true, allErrors: false, validateFormats: false }).compile(purityReadingJsonSchema())
const refined: ReadonlySet<string> = new Set(REFINEMENTS.map(({ code }) => code))

/** Values that stand at the bounds of something, or are of the wrong kind. */
const oddValue = fc.oneof(
  fc.constantFrom<unknown>(null, true, 0, -0, -0.1, 0.1, 10, 10.1, 100, 100.1, 1.5, -1, 2 ** 53, -60, 90.1, 20_001, '', ' ', 'x', '\u0000', '\ud800', [], {}),
  fc.constantFrom<unknown>('vehicle', 'cylinder', 'mass', 'within', 'gauge', 'absolute', '<', 'purity-reading/1', '2026-02-30T00:00:00Z', '2026-02-28T00:00:00', '1999-01-01T00:00:00Z', '2026-13-01T00:00:00Z', ...SUBSTANCES),
  fc.constantFrom(99, 100, 101, 1_999, 2_000, 2_001).map(length => 'x'.repeat(length)),
)
const oddName = fc.constantFrom('vin', 'tag', 'number', 'port', 'note', 'airQualifier', 'airPercent', 'qualifier', 'pressureKind', 'pressureKilopascal', 'ambientCelsius', '__proto__', 'constructor', 'x')

/** What only a refinement refuses. */
const refinedAway: ((reading: any) => void)[] = [
  r => r.sampledAt = '2026-02-30T00:00:00Z',
  r => r.sampledAt = '1999-12-31T23:59:59Z',
  r => r.subject = { kind: 'vehicle' },
  r => r.composition.parts.push(r.composition.parts[0]),
  r => r.composition.parts[0].percent = 50.05,
  (r) => {
    delete r.composition.airPercent
    r.composition.airQualifier = '<'
  },
  r => r.conditions = { pressureKind: 'gauge' },
  r => r.conditions = { pressureKilopascal: -1, pressureKind: 'absolute' },
  r => r.note = 'a\u0000',
  r => r.note = '\u{1F698}'.repeat(1_500),
]

type Damage = { kind: 'remove' | 'replace' | 'add' | 'refine', at: number, value: unknown, name: string }
const damages: fc.Arbitrary<Damage[]> = fc.array(fc.record({ kind: fc.constantFrom('remove' as const, 'replace' as const, 'add' as const, 'refine' as const), at: fc.nat(), value: oddValue, name: oddName }), { maxLength: 3 })

function damage(document: unknown, { kind, at, value, name }: Damage): unknown {
  if (kind === 'refine') {
    // Damage done before may have left nothing there to refine.
    try {
      refinedAway[at % refinedAway.length]!(document)
    } catch (error) {
      if (!(error instanceof TypeError)) throw error
    }
    return document
  }
  const places: { holder: Record<string, unknown>, key: string }[] = []
  const walk = (holder: unknown): void => {
    if (typeof holder !== 'object' || holder === null) return
    for (const key of Object.keys(holder)) {
      places.push({ holder: holder as Record<string, unknown>, key })
      walk((holder as Record<string, unknown>)[key])
    }
  }
  walk(document)
  if (places.length === 0) return document
  const { holder, key } = places[at % places.length]!
  if (kind === 'replace') holder[key] = value
  else if (kind === 'add' && !Array.isArray(holder)) Object.defineProperty(holder, name, { value, enumerable: true, configurable: true, writable: true })
  else if (Array.isArray(holder)) holder.splice(Number(key), 1)
  else delete holder[key]
  return document
}

describe('the published JSON Schema', () => {
  it('agrees with what is taken, the named refinements excepted', () => {
    let taken = 0
    let refusedByBoth = 0
    let refinedOnly = 0
    fc.assert(fc.property(anyReading, damages, (reading, damages) => {
      const document = damages.reduce<unknown>(damage, structuredClone(reading))
      const check = validateRecord(document)
      const accepted = accepts(document)
      if (check.ok) {
        taken++
        expect(accepted, JSON.stringify(accepts.errors)).toBe(true)
      } else if (accepted) {
        refinedOnly++
        for (const refusal of check.refusals) expect(refined, JSON.stringify(refusal)).toContain(refusal.code)
      } else refusedByBoth++
    }), { numRuns: 5_000 })
    // Each of the three happens often enough to mean something.
    expect(Math.min(taken, refusedByBoth, refinedOnly)).toBeGreaterThan(50)
  })

  it('has an id, and names every refinement', () => {
    const schema = purityReadingJsonSchema()
    expect(schema.$id).toBe('/schema/purity-reading.v1.json')
    for (const { text } of REFINEMENTS) expect(schema.description).toContain(text)
  })
})
