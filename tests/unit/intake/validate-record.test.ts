import { describe, expect, it } from 'vitest'
import { validateRecord } from '#shared/intake/validate-record'
import { reading } from './samples'

function refusalsOf(value: unknown) {
  const check = validateRecord(value)
  return check.ok ? [] : check.refusals
}

describe('a reading that fits', () => {
  it('is taken as it is', () => {
    expect(validateRecord(reading())).toEqual({ ok: true, reading: reading() })
  })

  it('keeps texts exactly, spaces included', () => {
    const check = validateRecord(reading((r) => {
      r.id = ' t 1 '
      r.note = '  =1+1 '
    }))
    expect(check).toMatchObject({ ok: true, reading: { id: ' t 1 ', note: '  =1+1 ' } })
  })

  it('stores −0 as 0', () => {
    const check = validateRecord(reading((r) => {
      r.composition.airPercent = -0
      r.conditions = { ambientCelsius: -0 }
      r.instrument.sequence = -0
    }))
    if (!check.ok) throw new Error('refused')
    expect(Object.is(check.reading.composition.airPercent, 0)).toBe(true)
    expect(Object.is(check.reading.conditions!.ambientCelsius, 0)).toBe(true)
    expect(Object.is(check.reading.instrument.sequence, 0)).toBe(true)
  })

  it.each([
    ['a vehicle by VIN alone', { kind: 'vehicle', vin: 'ZZ0TST003S0000123' }],
    ['a vehicle by work order alone', { kind: 'vehicle', workOrder: 'WO-1', port: 'high' }],
    ['a cylinder', { kind: 'cylinder', tag: 'CY-1' }],
    ['a lot', { kind: 'lot', number: 'L-1' }],
    ['a check', { kind: 'check', standard: 'CS-1' }],
  ])('may be of %s', (_, subject) => {
    expect(validateRecord(reading(r => r.subject = subject)).ok).toBe(true)
  })

  it('may add up to a little less or more than 100: that is flagged, not refused', () => {
    expect(validateRecord(reading(r => r.composition.parts[0].percent = 98.5)).ok).toBe(true)
    expect(validateRecord(reading(r => r.composition.parts[0].percent = 100)).ok).toBe(true)
  })

  it.each([
    '2026-03-14T09:26:53Z', '2026-03-14T09:26:53.123456+05:45', '2024-02-29T00:00:00-12:00', '2026-12-31T23:59:59+14:00',
  ])('may be sampled at %s', (sampledAt) => {
    expect(validateRecord(reading(r => r.sampledAt = sampledAt)).ok).toBe(true)
  })
})

describe('a reading that does not fit is refused at its place', () => {
  const percent = '/composition/parts/0/percent'
  const cases: [string, (reading: any) => void, { code: string, pointer: string, value?: string }][] = [
    ['a percentage as text', r => r.composition.parts[0].percent = '99.4', { code: 'type', pointer: percent, value: '99.4' }],
    ['a percentage that is null', r => r.composition.parts[0].percent = null, { code: 'type', pointer: percent, value: 'null' }],
    ['a percentage below 0', r => r.composition.parts[0].percent = -0.1, { code: 'range', pointer: percent, value: '-0.1' }],
    ['a percentage above 100', r => r.composition.parts[0].percent = 100.1, { code: 'range', pointer: percent, value: '100.1' }],
    ['a sequence with a fraction', r => r.instrument.sequence = 1.5, { code: 'range', pointer: '/instrument/sequence' }],
    ['a negative sequence', r => r.instrument.sequence = -1, { code: 'range', pointer: '/instrument/sequence' }],
    ['a resolution of 0', r => r.composition.resolution = 0, { code: 'range', pointer: '/composition/resolution' }],
    ['a resolution above 10', r => r.composition.resolution = 10.5, { code: 'range', pointer: '/composition/resolution' }],
    ['Fahrenheit as Celsius', r => r.conditions = { ambientCelsius: 95 }, { code: 'range', pointer: '/conditions/ambientCelsius' }],
    ['a pressure without kind', r => r.conditions = { pressureKilopascal: 500 }, { code: 'pressure', pointer: '/conditions/pressureKind' }],
    ['a kind without pressure', r => r.conditions = { pressureKind: 'gauge' }, { code: 'pressure', pointer: '/conditions/pressureKilopascal' }],
    ['a negative absolute pressure', r => r.conditions = { pressureKilopascal: -1, pressureKind: 'absolute' }, { code: 'range', pointer: '/conditions/pressureKilopascal' }],
    ['air below detection without air', (r) => {
      delete r.composition.airPercent
      r.composition.airQualifier = '<'
    }, { code: 'missing', pointer: '/composition/airPercent' }],
    ['J16 parts that add up to 97', r => r.composition.parts[0].percent = 96.4, { code: 'sum', pointer: '/composition' }],
    ['J16 parts that add up to 103', r => r.composition.parts[1].percent = 3.6, { code: 'sum', pointer: '/composition' }],
    ['air counted apart that was counted within', r => r.composition.air = 'within', { code: 'sum', pointer: '/composition' }],
    ['C22 fractions', r => r.composition.parts = [{ substance: 'R-134a', percent: 0.994 }, { substance: 'HC', percent: 0.006 }], { code: 'sum', pointer: '/composition' }],
    ['nothing but air', (r) => {
      r.composition.air = 'within'
      r.composition.parts = [{ substance: 'R-134a', percent: 0 }]
      r.composition.airPercent = 100
    }, { code: 'nothing-found', pointer: '/composition/parts' }],
    ['nothing above detection', r => r.composition.parts = [{ substance: 'R-134a', percent: 100, qualifier: '<' }], { code: 'nothing-found', pointer: '/composition/parts' }],
    ['no part', r => r.composition.parts = [], { code: 'length', pointer: '/composition/parts' }],
    ['a substance twice', r => r.composition.parts[1].substance = 'R-134a', { code: 'duplicate-substance', pointer: '/composition/parts/1/substance' }],
    ['a substance nobody knows', r => r.composition.parts[1].substance = 'R-9999', { code: 'unknown-substance', pointer: '/composition/parts/1/substance' }],
    ['a time without offset', r => r.sampledAt = '2026-03-14T09:26:53', { code: 'time', pointer: '/sampledAt' }],
    ['a day that does not exist', r => r.sampledAt = '2026-02-30T10:00:00Z', { code: 'time', pointer: '/sampledAt' }],
    ['29 February of a common year', r => r.sampledAt = '2100-02-29T10:00:00Z', { code: 'time', pointer: '/sampledAt' }],
    ['a time as number', r => r.sampledAt = 1773480413, { code: 'time', pointer: '/sampledAt', value: '1773480413' }],
    ['a leap second', r => r.sampledAt = '2026-06-30T23:59:60Z', { code: 'time', pointer: '/sampledAt' }],
    ['a clock that was never set', r => r.sampledAt = '1970-01-01T00:00:00Z', { code: 'time', pointer: '/sampledAt' }],
    ['a NUL', r => r.note = 'a\u0000b', { code: 'bad-character', pointer: '/note', value: 'a\uFFFDb' }],
    ['half a surrogate pair', r => r.note = '\ud800', { code: 'bad-character', pointer: '/note', value: '\uFFFD' }],
    ['an id of spaces', r => r.id = '   ', { code: 'blank', pointer: '/id' }],
    ['an empty id', r => r.id = '', { code: 'length', pointer: '/id' }],
    ['an id of 101 characters', r => r.id = 'x'.repeat(101), { code: 'length', pointer: '/id' }],
    ['a note of 2,001 characters', r => r.note = 'x'.repeat(2_001), { code: 'length', pointer: '/note' }],
    ['a member nobody knows', r => r.extra = 1, { code: 'unknown-member', pointer: '/extra', value: '1' }],
    ['a member that needs escaping', r => r.instrument['a/b~c'] = 1, { code: 'unknown-member', pointer: '/instrument/a~1b~0c' }],
    ['a vehicle without identifier', r => r.subject = { kind: 'vehicle', port: 'low' }, { code: 'subject', pointer: '/subject' }],
    ['a cylinder with a plate', r => r.subject = { kind: 'cylinder', tag: 'CY-1', plate: 'TST 001' }, { code: 'unknown-member', pointer: '/subject/plate' }],
    ['a cylinder without tag', r => r.subject = { kind: 'cylinder' }, { code: 'missing', pointer: '/subject/tag' }],
    ['another kind of subject', r => r.subject.kind = 'boat', { code: 'choice', pointer: '/subject/kind', value: 'boat' }],
    ['no kind of subject', r => delete r.subject.kind, { code: 'missing', pointer: '/subject/kind' }],
    ['another basis', r => r.composition.basis = 'volume', { code: 'choice', pointer: '/composition/basis', value: 'volume' }],
    ['another qualifier', r => r.composition.parts[1].qualifier = '>', { code: 'choice', pointer: '/composition/parts/1/qualifier', value: '>' }],
    ['another schema', r => r.schema = 'purity-reading/2', { code: 'schema', pointer: '/schema' }],
    ['no schema', r => delete r.schema, { code: 'missing', pointer: '/schema' }],
  ]

  it.each(cases)('%s', (_, change, expected) => {
    const refusals = refusalsOf(reading(change))
    expect(refusals).toEqual([expect.objectContaining(expected)])
    expect(refusals[0]!.reason).not.toBe('')
    expect(refusals[0]!.mend).not.toBe('')
  })

  it.each([['17', 17], ['null', null], ['a text', 'x'], ['a list', []], ['nothing', undefined]])('%s instead of an object', (_, value) => {
    expect(refusalsOf(value)).toEqual([expect.objectContaining({ code: value === undefined ? 'missing' : 'type', pointer: '' })])
  })

  it('tells every fault, not only the first', () => {
    const refusals = refusalsOf(reading((r) => {
      r.composition.parts[0].percent = 101
      r.sampledAt = 'yesterday'
      r.extra = 1
    }))
    expect(refusals.map(({ pointer }) => pointer).sort()).toEqual(['/composition/parts/0/percent', '/extra', '/sampledAt'])
  })

  it('stays small however much is wrong', () => {
    const refusals = refusalsOf(reading((r) => {
      for (let index = 0; index < 10_000; index++) r[`member${index}`] = 'x'.repeat(10_000)
    }))
    expect(refusals.length).toBeLessThanOrEqual(20)
    expect(JSON.stringify(refusals).length).toBeLessThan(20_000)
  })
})

describe('a designation that is not known', () => {
  it.each([
    ['R134A', 'R-134a'],
    ['r-134a', 'R-134a'],
    ['R1234YF', 'R-1234yf'],
    ['R-401A', 'R-404A'],
  ])('%s is not guessed, but %s is named', (written, near) => {
    const [refusal] = refusalsOf(reading(r => r.declared = written))
    expect(refusal).toMatchObject({ code: 'unknown-substance', pointer: '/declared', value: written })
    expect(refusal!.reason).toContain(near)
    expect(refusal!.mend).toContain('R-410A')
  })

  it('a group can be measured but not declared', () => {
    expect(refusalsOf(reading(r => r.declared = 'HC'))).toEqual([expect.objectContaining({ code: 'unknown-substance', pointer: '/declared' })])
    expect(refusalsOf(reading(r => r.declared = 'HC'))[0]!.mend).not.toContain('OTHER')
  })
})

describe('names that every object has', () => {
  it('are members nobody knows, and change nothing', () => {
    const value = JSON.parse(JSON.stringify(reading()).replace('{', '{"__proto__":{"admin":true},"constructor":{"prototype":{"admin":true}},'))
    expect(refusalsOf(value).map(({ code, pointer }) => [code, pointer])).toEqual([['unknown-member', '/__proto__'], ['unknown-member', '/constructor']])
    expect(({} as { admin?: boolean }).admin).toBeUndefined()
  })
})
