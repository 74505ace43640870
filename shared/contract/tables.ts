import { INTAKE_LIMITS, REFUSED_VALUE_LENGTH } from '../intake/limits'
import { csvColumns, type CsvColumn } from '../intake/csv-columns'
import { INTAKE_MEDIA_TYPES, type IntakeFormat } from '../intake/media-types'
import { REFUSALS, type RefusalCode } from '../intake/refusal'
import { CALLS, IDEMPOTENCY_KEY_LENGTH, PREFER_WAIT_SECONDS } from './calls'
import { exampleCsv, exampleJson, exampleNdjson } from './examples'
import { PROBLEMS } from './problems'
import { purityReadingJsonSchema, type JsonSchema } from './reading-json-schema'
import { REFINEMENTS } from './refinements'

export interface MemberRow {
  /** JSON Pointer; `*` stands for any entry of a list. */
  pointer: string
  required: boolean
  type: string
  range: string
  meaning: string
}

export interface LimitRow {
  what: string
  limit: number
  unit: string
  /** Code of the refusal beyond it. */
  code: RefusalCode | null
}

export interface ContractTables {
  members: MemberRow[]
  csvColumns: readonly CsvColumn[]
  mediaTypes: { mediaType: string, format: IntakeFormat }[]
  limits: LimitRow[]
  refusals: { code: RefusalCode, scope: 'record' | 'submission' | 'either', reason: string, mend: string }[]
  problems: typeof PROBLEMS
  refinements: typeof REFINEMENTS
  calls: typeof CALLS
  examples: { json: string, ndjson: string, csv: string }
}

/** What the documentation page shows; everything in it is drawn from what the server itself uses. */
export function contractTables(): ContractTables {
  return {
    members: memberRows(purityReadingJsonSchema(), '', true),
    csvColumns,
    mediaTypes: Object.entries(INTAKE_MEDIA_TYPES).map(([mediaType, format]) => ({ mediaType, format })),
    limits: limitRows(),
    refusals: (Object.keys(REFUSALS) as RefusalCode[]).map(code => ({ code, ...REFUSALS[code] })),
    problems: PROBLEMS,
    refinements: REFINEMENTS,
    calls: CALLS,
    examples: { json: exampleJson, ndjson: exampleNdjson, csv: exampleCsv },
  }
}

function limitRows(): LimitRow[] {
  return [
    { what: 'JSON body, inflated', limit: INTAKE_LIMITS.jsonBodyBytes, unit: 'bytes', code: 'too-large' },
    { what: 'NDJSON or CSV body, as sent', limit: INTAKE_LIMITS.streamBodyBytes, unit: 'bytes', code: 'too-large' },
    { what: 'Any body, inflated', limit: INTAKE_LIMITS.inflatedBytes, unit: 'bytes', code: 'inflated-too-large' },
    { what: 'Readings in one JSON body', limit: INTAKE_LIMITS.jsonReadings, unit: 'readings', code: 'too-many-readings' },
    { what: 'Records in one NDJSON or CSV body', limit: INTAKE_LIMITS.streamRecords, unit: 'records', code: 'too-many-rows' },
    { what: 'One line', limit: INTAKE_LIMITS.lineBytes, unit: 'bytes', code: 'line-too-long' },
    { what: 'One CSV field', limit: INTAKE_LIMITS.fieldCharacters, unit: 'characters', code: 'field-too-long' },
    { what: 'Columns of a CSV header', limit: INTAKE_LIMITS.csvColumns, unit: 'columns', code: 'header' },
    { what: 'Objects and lists inside one another in one record', limit: INTAKE_LIMITS.jsonDepth, unit: 'levels', code: 'too-deep' },
    { what: 'Refused value that is told back', limit: REFUSED_VALUE_LENGTH, unit: 'characters', code: null },
    { what: 'Idempotency-Key', limit: IDEMPOTENCY_KEY_LENGTH, unit: 'characters', code: null },
    { what: 'Prefer: wait', limit: PREFER_WAIT_SECONDS.maximum, unit: 'seconds', code: null },
  ]
}

interface SchemaNode extends JsonSchema {
  type?: string
  description?: string
  properties?: Record<string, SchemaNode>
  required?: string[]
  items?: SchemaNode
  oneOf?: SchemaNode[]
  enum?: string[]
  const?: string
}

function memberRows(schema: JsonSchema, pointer: string, required: boolean): MemberRow[] {
  const node = schema as SchemaNode
  const own = pointer === '' ? [] : [{ pointer, required, type: typeOf(node), range: rangeOf(node), meaning: node.description ?? '' }]
  const inner = node.items !== undefined ? memberRows(node.items, `${pointer}/*`, true).slice(1) : []
  const members = Object.entries(node.properties ?? {}).flatMap(([name, member]) => memberRows(member, `${pointer}/${name}`, node.required?.includes(name) ?? false))
  return [...own, ...inner, ...members, ...kindRows(node.oneOf ?? [], pointer)]
}

/** Of an alternative by kind: the kind once with its choices, then the members of each. */
function kindRows(alternatives: SchemaNode[], pointer: string): MemberRow[] {
  if (alternatives.length === 0) return []
  const kinds = alternatives.map(alternative => alternative.properties!.kind!.const!)
  const kind: MemberRow = { pointer: `${pointer}/kind`, required: true, type: 'text', range: kinds.join(', '), meaning: 'Which of the members below belong to it.' }
  const rows = alternatives.flatMap((alternative, index) => memberRows(alternative, pointer, true)
    .filter(row => row.pointer !== pointer && row.pointer !== `${pointer}/kind`)
    .map(row => ({ ...row, meaning: `Of a ${kinds[index]}: ${row.meaning}` })))
  return [kind, ...rows]
}

const TYPES: Readonly<Record<string, string>> = { string: 'text', number: 'number', integer: 'whole number', object: 'object', array: 'list' }

function typeOf(node: SchemaNode): string {
  if (node.oneOf !== undefined) return 'object'
  return node.format === 'date-time' ? 'time' : TYPES[node.type ?? ''] ?? ''
}

function rangeOf(node: SchemaNode): string {
  if (node.const !== undefined) return `"${node.const}"`
  if (node.enum !== undefined) return node.enum.join(', ')
  const { minimum, exclusiveMinimum, maximum, minLength, maxLength, minItems, maxItems } = node
  if (maximum !== undefined) return exclusiveMinimum === undefined ? `${minimum} to ${maximum}` : `above ${exclusiveMinimum}, to ${maximum}`
  if (maxLength !== undefined) return `${minLength ?? 0} to ${maxLength} characters`
  if (maxItems !== undefined) return `${minItems ?? 0} to ${maxItems} entries`
  return ''
}
