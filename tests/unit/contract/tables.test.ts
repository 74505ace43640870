import { describe, expect, it } from 'vitest'
import { exampleCsv, exampleJson, exampleNdjson } from '#shared/contract/examples'
import { purityReadingJsonSchema } from '#shared/contract/reading-json-schema'
import { contractTables } from '#shared/contract/tables'
import { PROBLEMS } from '#shared/contract/problems'
import { csvColumns, percentColumnOf } from '#shared/intake/csv-columns'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import { REFUSALS, type RefusalCode } from '#shared/intake/refusal'
import { SUBSTANCES } from '#shared/refrigerants/designations'
import { decode } from '../intake/samples'

const tables = contractTables()

describe('the columns of CSV', () => {
  const members = new Map(tables.members.map(member => [member.pointer, member]))

  it('lead to members of the schema that exist, and of the right kind', () => {
    for (const column of csvColumns) {
      if (column.kind === 'guard') continue
      const member = members.get(column.pointer)
      expect(member, column.name).toBeDefined()
      if (column.substance !== undefined) expect(member!.type).toBe('list')
      else if (column.kind === 'number' || column.kind === 'percent') expect(member!.type).toMatch(/number$/)
      else expect(['text', 'time']).toContain(member!.type)
    }
  })

  it('cover every member of the schema', () => {
    const covered = new Set(csvColumns.map(({ pointer }) => pointer))
    const beyondColumns = tables.members.map(({ pointer, type }) => ({ pointer, type }))
      .filter(({ pointer, type }) => type !== 'object' && !covered.has(pointer))
      .map(({ pointer }) => pointer)
    // The schema's name is not sent in CSV; the rest is in the percentage cells.
    expect(beyondColumns).toEqual(['/schema', '/composition/parts/*/substance', '/composition/parts/*/percent', '/composition/parts/*/qualifier', '/composition/airQualifier'])
  })

  it('are required where the schema requires the member', () => {
    for (const column of csvColumns) {
      const member = members.get(column.pointer)
      if (member === undefined || column.substance !== undefined || column.pointer.startsWith('/subject/')) continue
      const holder = members.get(column.pointer.replace(/\/[^/]+$/, ''))
      expect(column.required, column.name).toBe(member.required && (holder?.required ?? true))
    }
  })

  it('have one percentage for every substance', () => {
    expect(csvColumns.flatMap(({ substance }) => substance ?? [])).toEqual(SUBSTANCES)
    expect(percentColumnOf('R-1234yf')).toBe('r1234yf_pct')
    expect(new Set(csvColumns.map(({ name }) => name)).size).toBe(csvColumns.length)
  })

  it('hold the columns that the contract has always named', () => {
    const promised = 'id, sampled_at, instrument_serial, sequence, subject_kind, vin, plate, work_order, cylinder, lot, check_standard, declared, basis, air, resolution, r134a_pct, r1234yf_pct, r12_pct, r22_pct, r152a_pct, hc_pct, other_pct, air_pct, ambient_c, pressure_kpa, pressure_kind, operator, batch, note'
    expect(csvColumns.map(({ name }) => name)).toEqual(expect.arrayContaining(promised.split(', ')))
  })
})

describe('the members of a reading', () => {
  it('each have a type and a meaning', () => {
    for (const { pointer, type, meaning } of tables.members) {
      expect(type, pointer).not.toBe('')
      if (pointer !== '/schema') expect(meaning, pointer).not.toBe('')
    }
  })

  it('are those at the top of the schema', () => {
    const top = Object.keys(purityReadingJsonSchema().properties as object)
    expect(tables.members.filter(({ pointer }) => pointer.lastIndexOf('/') === 0).map(({ pointer }) => pointer.slice(1))).toEqual(top)
  })
})

describe('limits and codes', () => {
  it('print every limit that the decoders check', () => {
    const printed = tables.limits.map(({ limit }) => limit)
    for (const [name, limit] of Object.entries(INTAKE_LIMITS)) expect(printed, name).toContain(limit)
  })

  it('tell for every code why and how to mend it', () => {
    expect(tables.refusals.map(({ code }) => code)).toEqual(Object.keys(REFUSALS))
    for (const { reason, mend } of tables.refusals) expect(Math.min(reason.length, mend.length)).toBeGreaterThan(10)
  })

  it('explain each problem once', () => {
    expect(new Set(PROBLEMS.map(({ code }) => code)).size).toBe(PROBLEMS.length)
  })

  it('explain as problems what fails a whole JSON body at the door', () => {
    const atTheDoor: RefusalCode[] = ['syntax', 'encoding', 'empty', 'type', 'unknown-member', 'duplicate-member', 'too-many-readings', 'media-type', 'content-encoding', 'gzip', 'too-large', 'inflated-too-large']
    expect(PROBLEMS.map(({ code }) => code)).toEqual(expect.arrayContaining(atTheDoor))
  })
})

describe('the examples', () => {
  it.each([
    ['JSON', exampleJson, 'application/json', 1],
    ['NDJSON', exampleNdjson, 'application/x-ndjson', 2],
    ['CSV', exampleCsv, 'text/csv', 2],
  ])('in %s are taken', async (_, body, mediaType, count) => {
    const { readings, refusals } = await decode(body, { mediaType })
    expect(refusals).toEqual([])
    expect(readings).toHaveLength(count)
  })
})
