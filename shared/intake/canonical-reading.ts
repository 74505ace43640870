import { SUBSTANCES } from '../refrigerants/designations'
import type { PurityReading } from './reading-schema'
import { momentOf } from './sampling-time'

const order: ReadonlyMap<string, number> = new Map(SUBSTANCES.map((substance, index) => [substance, index]))

/**
 * What a reading says, as canonical JSON (RFC 8785): the input of its content digest. Two readings with
 * equal text here are the same reading sent twice. Order of members and of parts, an empty text in place
 * of none, and the offset in which the moment is written make no difference; the form of the submission
 * (JSON, NDJSON, CSV) makes none either.
 */
export function canonicalReading(reading: PurityReading): string {
  return canonicalJson(contentOf(reading))
}

function contentOf(reading: PurityReading): unknown {
  const { composition, conditions } = reading
  const parts = composition.parts.toSorted((a, b) => order.get(a.substance)! - order.get(b.substance)!)
  return {
    ...reading,
    sampledAt: momentOf(reading.sampledAt),
    composition: { ...composition, parts },
    conditions: conditions !== undefined && Object.values(conditions).some(value => value !== undefined) ? conditions : undefined,
    operator: reading.operator || undefined,
    batch: reading.batch || undefined,
    note: reading.note || undefined,
  }
}

/**
 * RFC 8785 for values that `JSON.stringify` can write: members in order of the UTF-16 code units of
 * their names, numbers and texts as ECMAScript writes them. Members that are undefined are left out.
 */
export function canonicalJson(value: unknown): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value)
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`
  const members: string[] = []
  for (const name of Object.keys(value).sort()) {
    const member = (value as Record<string, unknown>)[name]
    if (member !== undefined) members.push(`${JSON.stringify(name)}:${canonicalJson(member)}`)
  }
  return `{${members.join(',')}}`
}
