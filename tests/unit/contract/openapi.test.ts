import Ajv2020 from 'ajv/dist/2020.js'
import { describe, expect, it } from 'vitest'
import { CALLS } from '#shared/contract/calls'
import { openApiDocument } from '#shared/contract/openapi'
import { PROBLEMS } from '#shared/contract/problems'
import { INTAKE_MEDIA_TYPES } from '#shared/intake/media-types'
import { reading } from '../intake/samples'

interface Operation {
  operationId: string
  summary: string
  security: unknown[]
  parameters?: { name: string, in: string }[]
  responses: Record<string, { description: string, headers?: object, content?: Record<string, { schema?: { $ref: string } }> }>
  requestBody?: { content: Record<string, { schema: object, example?: unknown }> }
}

const document = openApiDocument({ baseUrl: 'http://127.0.0.1:3000' }) as {
  openapi: string
  servers: { url: string }[]
  paths: Record<string, Record<string, Operation>>
  components: { schemas: Record<string, object>, headers: Record<string, object> }
}
const operations = Object.entries(document.paths).flatMap(([path, methods]) => Object.entries(methods).map(([method, operation]) => ({ path, method, operation })))

describe('the OpenAPI document', () => {
  it('is of version 3.1 and names its server', () => {
    expect(document.openapi).toBe('3.1.0')
    expect(document.servers).toEqual([{ url: 'http://127.0.0.1:3000' }])
  })

  it('holds every call, and no other', () => {
    expect(operations.map(({ path, method }) => `${method.toUpperCase()} ${path}`).sort()).toEqual(CALLS.map(({ path, method }) => `${method} ${path}`).sort())
    expect(new Set(operations.map(({ operation }) => operation.operationId)).size).toBe(operations.length)
  })

  it('leads each reference to something', () => {
    const references = [...JSON.stringify(document).matchAll(/"\$ref":"#\/components\/(\w+)\/(\w+)"/g)]
    expect(references.length).toBeGreaterThan(20)
    for (const [, kind, name] of references) expect(Object.keys(document.components[kind as 'schemas' | 'headers']), name).toContain(name)
  })

  it('declares each parameter of a path', () => {
    for (const { path, operation } of operations) {
      const named = [...path.matchAll(/\{(\w+)\}/g)].map(match => match[1])
      expect((operation.parameters ?? []).filter(parameter => parameter.in === 'path').map(({ name }) => name)).toEqual(named)
    }
  })

  it('has schemas that compile, and refuses a wrong reading in a list', () => {
    const ajv = new Ajv2020({ strict: false, validateFormats: false })
    ajv.addSchema({ $id: 'http://127.0.0.1/openapi', components: document.components })
    for (const name of Object.keys(document.components.schemas)) {
      expect(ajv.getSchema(`http://127.0.0.1/openapi#/components/schemas/${name}`), name).toBeTypeOf('function')
    }
    const takesList = ajv.getSchema('http://127.0.0.1/openapi#/components/schemas/Readings')!
    expect(takesList({ readings: [reading()] })).toBe(true)
    expect(takesList({ readings: [reading(r => delete r.id)] })).toBe(false)
    expect(takesList({ readings: [] })).toBe(false)
  })

  it('tells every problem of a status with its code', () => {
    const post = document.paths['/api/v1/readings']!.post!
    for (const status of [400, 401, 403, 409, 413, 415, 422, 429, 500, 503]) {
      const response = post.responses[status]!
      expect(Object.keys(response.content!)).toEqual(['application/problem+json'])
      for (const { code } of PROBLEMS.filter(problem => problem.status === status)) expect(response.description).toContain(code)
    }
    for (const status of [409, 429, 503]) expect(Object.keys(post.responses[status]!.headers!)).toContain('Retry-After')
  })

  it('offers every media type for the body', () => {
    const post = document.paths['/api/v1/readings']!.post!
    expect(Object.keys(post.requestBody!.content)).toEqual(Object.keys(INTAKE_MEDIA_TYPES))
    expect(Object.keys(post.responses[202]!.headers!)).toEqual(['Location', 'Idempotency-Replayed'])
    expect(post.parameters!.map(({ name }) => name)).toEqual(['Idempotency-Key', 'Prefer', 'Content-Encoding'])
  })
})
