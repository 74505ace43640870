import type { z } from 'zod'
import { checkSum } from '../composition/sum'
import { DESIGNATIONS, SUBSTANCES, isSubstance } from '../refrigerants/designations'
import { pointerTo, valueAt } from './json-pointer'
import { nearestSubstances } from './nearest-substance'
import { READING_SCHEMA, purityReading, type PurityReading, type RefinementParams } from './reading-schema'
import { refuse, type Refusal } from './refusal'
import { faultOfSamplingTime } from './sampling-time'
import { refuseSum } from './sum-refusal'

export type RecordCheck = { ok: true, reading: PurityReading } | { ok: false, refusals: Refusal[] }

/** More faults than this in one record tell nothing more. */
const MOST_REFUSALS = 20

/**
 * Checks one decoded record against the schema and the refinements that JSON Schema can't express.
 * Never throws, whatever the value. Each refusal says where (JSON Pointer), what stood there, why, and how to mend it.
 */
export function validateRecord(value: unknown): RecordCheck {
  const result = purityReading.safeParse(value)
  if (result.success) return checkComposition(result.data)
  const refusals = new Map<string, Refusal>()
  for (const issue of result.error.issues) {
    for (const refusal of refusalsOf(issue, value)) {
      // Of several faults at one place the first is the cause (too long a time is first of all no time).
      if (!refusals.has(refusal.pointer!)) refusals.set(refusal.pointer!, refusal)
      if (refusals.size >= MOST_REFUSALS) return { ok: false, refusals: [...refusals.values()] }
    }
  }
  return { ok: false, refusals: [...refusals.values()] }
}

function checkComposition(reading: PurityReading): RecordCheck {
  const { composition } = reading
  const refusal = refuseNothingFound(composition.parts) ?? refuseSum(checkSum(composition), composition.air)
  return refusal === undefined ? { ok: true, reading } : { ok: false, refusals: [refusal] }
}

/** Without any refrigerant there is no air-free composition. */
function refuseNothingFound(parts: PurityReading['composition']['parts']): Refusal | undefined {
  if (parts.some(({ percent, qualifier }) => percent > 0 && qualifier === undefined)) return undefined
  return refuse('nothing-found', { pointer: '/composition/parts' })
}

function refusalsOf(issue: z.core.$ZodIssue, record: unknown): Refusal[] {
  const pointer = pointerTo(issue.path)
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map(key => refuse('unknown-member', {
      pointer: pointerTo([...issue.path, key]),
      reason: `The schema has no member ${JSON.stringify(key.slice(0, 100))} here.`,
      value: valueAt(record, [...issue.path, key]),
    }))
  }
  const value = valueAt(record, issue.path)
  const at = { pointer, value }

  if (pointer === '/sampledAt' && value !== undefined) {
    const fault = typeof value === 'string' ? faultOfSamplingTime(value) : 'A time is a text, not a number or anything else.'
    return [refuse('time', fault === undefined ? at : { ...at, reason: fault })]
  }
  switch (issue.code) {
    case 'custom': {
      const { refusal, reason } = issue.params as RefinementParams
      return [refuse(refusal, reason === undefined ? at : { ...at, reason })]
    }
    case 'invalid_type':
      if (value === undefined) return [missing(pointer)]
      if (issue.expected === 'int') return [refuse('range', { ...at, reason: 'The number is not a whole number.' })]
      return [refuse('type', { ...at, reason: `Expected ${NAMES_OF_TYPES[issue.expected] ?? issue.expected}, found ${nameOfValue(value)}.` })]
    case 'invalid_value':
      return [refuseChoice(pointer, value, issue.values.map(String))]
    case 'invalid_union':
      return [refuseChoice(pointer, value, (issue as { options?: unknown[] }).options?.map(String) ?? ['vehicle', 'cylinder', 'lot', 'check'])]
    case 'too_small':
    case 'too_big':
      return [refuseSize(issue, at)]
    case 'invalid_format':
      return [refuse('blank', at)]
    default:
      return [refuse('type', at)]
  }
}

function missing(pointer: string): Refusal {
  return refuse('missing', { pointer, reason: `${pointer.slice(1).replaceAll('/', '.')} is missing.` })
}

function refuseChoice(pointer: string, value: unknown, allowed: string[]): Refusal {
  if (value === undefined) return missing(pointer)
  if (typeof value !== 'string') return refuse('type', { pointer, value, reason: `Expected a text, found ${nameOfValue(value)}.` })
  if (pointer === '/schema') return refuse('schema', { pointer, value, reason: `The schema "${value.slice(0, 100)}" is not understood; ${READING_SCHEMA} is.` })
  if (pointer === '/declared' || pointer.endsWith('/substance')) return refuseSubstance(pointer, value)
  return refuse('choice', { pointer, value, mend: `Send one of: ${allowed.join(', ')}.` })
}

function refuseSubstance(pointer: string, value: string): Refusal {
  const declared = pointer === '/declared'
  const known = declared ? DESIGNATIONS : SUBSTANCES
  const near = nearestSubstances(value, known)
  const question = near.length > 0 ? ` Nearest: ${near.join(', ')}.` : ''
  const reason = declared && isSubstance(value)
    ? `${value} is a group, not a refrigerant that a system can be declared to hold.`
    : `"${value.slice(0, 100)}" is not a designation that is known here.${question}`
  return refuse('unknown-substance', { pointer, value, reason, mend: `Use the exact spelling of one of: ${known.join(', ')}.` })
}

function refuseSize(issue: z.core.$ZodIssueTooSmall | z.core.$ZodIssueTooBig, at: { pointer: string, value: unknown }): Refusal {
  const bound = issue.code === 'too_small'
    ? `${issue.inclusive === false ? 'above' : 'at least'} ${issue.minimum}`
    : `${issue.inclusive === false ? 'below' : 'at most'} ${issue.maximum}`
  if (issue.origin === 'string') return refuse('length', { ...at, reason: `The text has ${(at.value as string).length} characters, and must have ${bound}.` })
  if (issue.origin === 'array') return refuse('length', { pointer: at.pointer, reason: `The list has ${(at.value as unknown[]).length} entries, and must have ${bound}.`, mend: 'Send each substance that was reported once.' })
  return refuse('range', { ...at, reason: `${String(at.value)} is outside the range: the number must be ${bound}.` })
}

const NAMES_OF_TYPES: Readonly<Record<string, string>> = {
  string: 'a text', number: 'a number', object: 'an object', array: 'a list', int: 'a whole number',
}

function nameOfValue(value: unknown): string {
  if (value === null) return 'null'
  if (Array.isArray(value)) return 'a list'
  return NAMES_OF_TYPES[typeof value] ?? `a ${typeof value}`
}
