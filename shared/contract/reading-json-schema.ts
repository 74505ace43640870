import { z } from 'zod'
import { purityReading } from '../intake/reading-schema'
import { REFINEMENTS } from './refinements'

/** Where the schema is published. */
export const READING_SCHEMA_PATH = '/schema/purity-reading.v1.json'

export type JsonSchema = Record<string, unknown>

/** JSON Schema (2020-12) of one purity reading, drawn from the zod definition; what it can't express is told in its description. */
export function purityReadingJsonSchema(): JsonSchema {
  const { $schema, ...schema } = z.toJSONSchema(purityReading, { io: 'input', target: 'draft-2020-12' })
  const beyond = REFINEMENTS.map(({ pointer, code, text }) => `${pointer} (${code}): ${text}`).join(' ')
  return {
    $schema,
    $id: READING_SCHEMA_PATH,
    title: 'Purity reading, schema 1',
    description: `One sampled refrigerant composition as an instrument showed it. Checked beyond this schema: ${beyond}`,
    ...schema,
  }
}
