import type { H3Event } from 'h3'
import type { z } from 'zod'
import { Problem } from './problem'

function refused(status: 400 | 422, error: z.ZodError, place: 'pointer' | 'parameter'): Problem {
  const errors = error.issues.map(issue => ({
    [place]: place === 'pointer' ? `/${issue.path.join('/')}` : String(issue.path[0] ?? ''),
    code: issue.code,
    detail: issue.message,
  }))
  return new Problem(status, 'invalid', errors.map(item => `${item.parameter ?? item.pointer}: ${item.detail}`).join('; ').slice(0, 500), { errors })
}

/** The query by schema; a parameter that may stand several times always arrives as a list. */
export function readQuery<S extends z.ZodObject>(event: H3Event, schema: S): z.infer<S> {
  const given: Record<string, unknown> = {}
  for (const [name, value] of Object.entries(getQuery(event))) {
    if (!Object.hasOwn(schema.shape, name)) throw new Problem(400, 'invalid', `There is no parameter "${name.slice(0, 60)}".`, { errors: [{ parameter: name.slice(0, 60), code: 'unknown', detail: 'There is no such parameter.' }] })
    given[name] = takesList(schema.shape[name]) && !Array.isArray(value) ? [value] : value
  }
  const parsed = schema.safeParse(given)
  if (!parsed.success) throw refused(400, parsed.error, 'parameter')
  return parsed.data as z.infer<S>
}

function takesList(schema: unknown): boolean {
  const definition = (schema as { def: { type: string, innerType?: unknown } }).def
  return definition.type === 'array' || (definition.innerType !== undefined && takesList(definition.innerType))
}

/** A small JSON body of our own screens, by schema. */
export async function readJsonBody<S extends z.ZodType>(event: H3Event, schema: S): Promise<z.infer<S>> {
  if (!(getHeader(event, 'content-type') ?? '').startsWith('application/json')) throw new Problem(415, 'media-type', 'Send application/json.')
  const bytes = await readBounded(event, 256 * 1024)
  let value: unknown
  try {
    value = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))
  } catch {
    throw new Problem(400, 'syntax', 'The body is not JSON.')
  }
  const parsed = schema.safeParse(value)
  if (!parsed.success) throw refused(422, parsed.error, 'pointer')
  return parsed.data
}

async function readBounded(event: H3Event, most: number): Promise<Buffer> {
  const parts: Buffer[] = []
  let length = 0
  for await (const part of event.node.req as AsyncIterable<Buffer>) {
    length += part.length
    if (length > most) throw new Problem(413, 'too-large', `The body is larger than ${most} bytes.`)
    parts.push(part)
  }
  return Buffer.concat(parts)
}

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/

/** An id from the path; anything else is simply not there. */
export function idFromPath(event: H3Event): string {
  const id = getRouterParam(event, 'id') ?? ''
  if (!UUID.test(id)) throw notFound()
  return id
}
