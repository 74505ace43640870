import canonicalize from 'canonicalize'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { contractTables } from '#shared/contract/tables'
import { canonicalReading } from '#shared/intake/canonical-reading'
import { anyReading } from './arbitraries'
import { reading } from './samples'

describe('the canonical form of a reading', () => {
  it('is what RFC 8785 says, as the package canonicalize writes it', () => {
    fc.assert(fc.property(anyReading, (reading) => {
      const text = canonicalReading(reading)
      expect(text).toBe(canonicalize(JSON.parse(text)))
    }), { numRuns: 1_000 })
  })

  it('holds every member of the schema', () => {
    const subjects = [
      { kind: 'vehicle', vin: 'V', plate: 'P', workOrder: 'W', port: 'low' }, { kind: 'cylinder', tag: 'T' }, { kind: 'lot', number: 'N' }, { kind: 'check', standard: 'S' },
    ]
    const held = new Set(subjects.flatMap((subject) => {
      const full = reading((r) => {
        r.subject = subject
        r.composition.parts[1].qualifier = '<'
        r.composition.airQualifier = '<'
        r.conditions = { ambientCelsius: 1, pressureKilopascal: 2, pressureKind: 'gauge' }
        Object.assign(r, { operator: 'o', batch: 'b', note: 'n' })
      })
      return pointersOf(JSON.parse(canonicalReading(full)), '')
    }))
    const known = contractTables().members.map(({ pointer }) => pointer)
    expect([...held].sort()).toEqual(known.sort())
  })
})

describe('the content of a reading', () => {
  it('does not depend on the order of members and parts', () => {
    fc.assert(fc.property(anyReading, fc.infiniteStream(fc.nat()), (reading, order) => {
      const shuffled = shuffle(reading, () => order.next().value as number)
      expect(canonicalReading(shuffled)).toBe(canonicalReading(reading))
    }))
  })

  it('is told apart by anything that was measured', () => {
    const texts = [
      reading(),
      reading(r => r.composition.parts[0].percent = 99.5),
      reading(r => r.composition.parts[1].qualifier = '<'),
      reading(r => r.composition.airPercent = 2.1),
      reading(r => delete r.composition.airPercent),
      reading(r => r.sampledAt = '2026-03-14T09:26:54-05:00'),
      reading(r => r.sampledAt = '2026-03-14T09:26:53.000001-05:00'),
      reading(r => r.subject.plate = 'TST 002'),
      reading(r => r.note = 'x'),
      reading(r => r.id = 't-2'),
    ].map(canonicalReading)
    expect(new Set(texts).size).toBe(texts.length)
  })

  it('is the same for two spellings of one moment, and for an empty text and none', () => {
    const same = canonicalReading(reading())
    expect(canonicalReading(reading(r => r.sampledAt = '2026-03-14T14:26:53Z'))).toBe(same)
    expect(canonicalReading(reading(r => r.sampledAt = '2026-03-14T14:26:53.000Z'))).toBe(same)
    expect(canonicalReading(reading((r) => {
      r.note = ''
      r.operator = ''
      r.batch = ''
      r.conditions = {}
    }))).toBe(same)
  })
})

function shuffle<Value>(value: Value, next: () => number): Value {
  if (Array.isArray(value)) return reorder(value.map(entry => shuffle(entry, next)), next) as Value
  if (typeof value !== 'object' || value === null) return value
  return Object.fromEntries(reorder(Object.entries(value), next).map(([name, member]) => [name, shuffle(member, next)])) as Value
}

function reorder<Entry>(entries: Entry[], next: () => number): Entry[] {
  return entries.map(entry => ({ entry, key: next() })).sort((a, b) => a.key - b.key).map(({ entry }) => entry)
}

function pointersOf(value: unknown, pointer: string): string[] {
  if (typeof value !== 'object' || value === null) return [pointer]
  if (Array.isArray(value)) return [pointer, ...value.flatMap(entry => pointersOf(entry, `${pointer}/*`).filter(inner => inner !== `${pointer}/*`))]
  const inner = Object.entries(value).flatMap(([name, member]) => pointersOf(member, `${pointer}/${name}`))
  return pointer === '' ? inner : [pointer, ...inner]
}
