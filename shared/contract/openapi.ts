import { z } from 'zod'
import { readingListQuery } from '../api/readings'
import { INTAKE_LIMITS } from '../intake/limits'
import { INTAKE_CONTENT_ENCODINGS, INTAKE_MEDIA_TYPES } from '../intake/media-types'
import { healthAnswer, problemAnswer, readingDetailAnswer, readingListAnswer, readyAnswer, receiptAnswer, submissionDetailAnswer, waitedAnswer } from './answers'
import { certificateAnswer, publicCertificateAnswer, signedCertificateAnswer } from './certificate-answers'
import { CALLS, IDEMPOTENCY_KEY_LENGTH, PREFER_WAIT_SECONDS } from './calls'
import { exampleCsv, exampleNdjson, exampleReading } from './examples'
import { PROBLEMS } from './problems'
import { purityReadingJsonSchema, type JsonSchema } from './reading-json-schema'

type Call = (typeof CALLS)[number]
type Json = Record<string, unknown>

/** OpenAPI 3.1 of the public calls. Its schemas are JSON Schema 2020-12, drawn from the same zod definitions that the server uses. */
export function openApiDocument({ baseUrl }: { baseUrl: string }): Json {
  return {
    openapi: '3.1.0',
    info: {
      title: 'Coldslip intake',
      version: '1.0.0',
      description: 'Sends purity readings in and reads them out. A submission that is taken in part is a success: it counts its refused records and tells each with place, reason and mend. Members may be added to answers; pass over those that you do not know.',
    },
    servers: [{ url: baseUrl }],
    tags: [{ name: 'intake' }, { name: 'readings' }, { name: 'operation' }],
    paths: pathsOf({
      '/api/v1/readings': { post: postReadings(), get: listReadings() },
      '/api/v1/submissions/{id}': { get: getSubmission() },
      '/api/v1/readings/{id}': { get: getReading() },
      '/api/v1/readings/{id}/certificate.pdf': { get: getCertificate() },
      '/api/v1/readings/{id}/certificate.json': { get: getSignedCertificate() },
      '/api/v1/readings/{id}/certificate': { post: postCertificate() },
      '/api/verify/{code}': { get: verifyCertificate() },
      '/api/health': { get: getHealth() },
      '/api/ready': { get: getReady() },
    }),
    components: {
      securitySchemes: { deviceToken: { type: 'http', scheme: 'bearer', description: 'Token of a device, with the scope intake or read.' } },
      schemas: {
        PurityReading: purityReadingJsonSchema(),
        Readings: { type: 'object', properties: { readings: { type: 'array', minItems: 1, maxItems: INTAKE_LIMITS.jsonReadings, items: reference('PurityReading') } }, required: ['readings'], additionalProperties: false },
        Receipt: answerSchema(receiptAnswer),
        Verdicts: answerSchema(waitedAnswer),
        Submission: answerSchema(submissionDetailAnswer),
        ReadingList: answerSchema(readingListAnswer),
        Reading: answerSchema(readingDetailAnswer),
        Certificate: answerSchema(certificateAnswer),
        SignedCertificate: answerSchema(signedCertificateAnswer),
        PublicCertificate: answerSchema(publicCertificateAnswer),
        Health: answerSchema(healthAnswer),
        Ready: answerSchema(readyAnswer),
        Problem: answerSchema(problemAnswer),
      },
      headers: {
        RetryAfter: { description: 'Seconds to wait before the same request is sent again.', schema: { type: 'integer', minimum: 0 } },
        Location: { description: 'Address of the submission.', schema: { type: 'string' } },
        IdempotencyReplayed: { description: '"true" where the same key had brought the same bytes before: nothing was stored this time.', schema: { type: 'string', const: 'true' } },
        PreferenceApplied: { description: 'The preference that was followed.', schema: { type: 'string' } },
      },
    },
  }
}

function postReadings(): Json {
  const text = (example: string): Json => ({ schema: { type: 'string' }, example })
  const bodies = Object.fromEntries(Object.entries(INTAKE_MEDIA_TYPES).map(([mediaType, format]): [string, Json] => {
    if (format === 'json') return [mediaType, { schema: { oneOf: [reference('PurityReading'), reference('Readings')] }, example: exampleReading }]
    return [mediaType, mediaType === 'text/tab-separated-values' ? { schema: { type: 'string' } } : text(format === 'ndjson' ? exampleNdjson : exampleCsv)]
  }))
  return operation('POST', '/api/v1/readings', {
    tags: ['intake'],
    security: [{ deviceToken: [] }],
    parameters: [
      { name: 'Idempotency-Key', in: 'header', required: false, description: 'Sent again with the same bytes, the first answer comes again and nothing is stored twice. Valid for the token\'s instrument.', schema: { type: 'string', minLength: 1, maxLength: IDEMPOTENCY_KEY_LENGTH } },
      { name: 'Prefer', in: 'header', required: false, description: `wait=N: wait up to N seconds (${PREFER_WAIT_SECONDS.minimum} to ${PREFER_WAIT_SECONDS.maximum}) for the verdicts.`, schema: { type: 'string' } },
      { name: 'Content-Encoding', in: 'header', required: false, schema: { type: 'string', enum: [...INTAKE_CONTENT_ENCODINGS] } },
    ],
    requestBody: { required: true, content: bodies },
    responses: {
      200: { description: 'Processed while you waited (Prefer: wait=N); with the verdicts.', headers: submissionHeaders(['PreferenceApplied']), content: jsonContent('Verdicts') },
      202: { description: 'Stored, and waiting to be processed.', headers: submissionHeaders([]), content: jsonContent('Receipt') },
      ...problems(400, 401, 403, 409, 413, 415, 422, 429, 500, 503),
    },
  })
}

function getSubmission(): Json {
  return operation('GET', '/api/v1/submissions/{id}', {
    tags: ['intake'],
    security: [{ deviceToken: [] }],
    parameters: [idParameter('Id of the submission, from Location.')],
    responses: { 200: { description: 'The submission.', content: jsonContent('Submission') }, ...problems(401, 403, 404, 429, 500, 503) },
  })
}

function listReadings(): Json {
  const { properties, required = [] } = z.toJSONSchema(readingListQuery, { io: 'input' }) as { properties: Record<string, JsonSchema>, required?: string[] }
  return operation('GET', '/api/v1/readings', {
    tags: ['readings'],
    security: [{ deviceToken: [] }],
    parameters: Object.entries(properties).map(([name, schema]) => ({ name, in: 'query', required: required.includes(name), schema: name === 'limit' ? { type: 'integer', minimum: 1, maximum: 200, default: 50 } : schema })),
    responses: { 200: { description: 'A page of readings.', content: jsonContent('ReadingList') }, ...problems(400, 401, 403, 429, 500, 503) },
  })
}

function getReading(): Json {
  return operation('GET', '/api/v1/readings/{id}', {
    tags: ['readings'],
    security: [{ deviceToken: [] }],
    parameters: [idParameter('Id of the reading.')],
    responses: { 200: { description: 'The reading.', content: jsonContent('Reading') }, ...problems(401, 403, 404, 429, 500, 503) },
  })
}

function getCertificate(): Json {
  return operation('GET', '/api/v1/readings/{id}/certificate.pdf', {
    tags: ['readings'],
    security: [{ deviceToken: [] }],
    parameters: [idParameter('Id of the reading.'), { name: 'format', in: 'query', required: false, schema: { type: 'string', enum: ['a4', 'letter'], default: 'a4' } }],
    responses: { 200: { description: 'The certificate.', content: { 'application/pdf': {} } }, ...problems(400, 401, 403, 404, 429, 500, 503) },
  })
}

function getSignedCertificate(): Json {
  return operation('GET', '/api/v1/readings/{id}/certificate.json', {
    tags: ['readings'],
    security: [{ deviceToken: [] }],
    parameters: [idParameter('Id of the reading.')],
    responses: { 200: { description: 'The statement, and the signature over its canonical JSON (RFC 8785).', content: jsonContent('SignedCertificate') }, ...problems(401, 403, 404, 429, 500, 503) },
  })
}

function postCertificate(): Json {
  return operation('POST', '/api/v1/readings/{id}/certificate', {
    tags: ['readings'],
    security: [{ deviceToken: [] }],
    parameters: [idParameter('Id of the reading.')],
    responses: {
      200: { description: 'The one that there was.', content: jsonContent('Certificate') },
      201: { description: 'Issued now.', content: jsonContent('Certificate') },
      ...problems(401, 403, 404, 422, 429, 500, 503),
    },
  })
}

function verifyCertificate(): Json {
  return operation('GET', '/api/verify/{code}', {
    tags: ['readings'],
    security: [],
    parameters: [{ name: 'code', in: 'path', required: true, description: 'Code of the certificate; case, spaces and hyphens do not count.', schema: { type: 'string' } }],
    responses: { 200: { description: 'There is such a certificate.', content: jsonContent('PublicCertificate') }, ...problems(404, 500, 503) },
  })
}

function getHealth(): Json {
  return operation('GET', '/api/health', { tags: ['operation'], security: [], responses: { 200: { description: 'The process answers.', content: jsonContent('Health') } } })
}

function getReady(): Json {
  return operation('GET', '/api/ready', {
    tags: ['operation'],
    security: [],
    responses: {
      200: { description: 'Ready.', content: jsonContent('Ready') },
      503: { description: 'Not ready yet, or not any more.', headers: { 'Retry-After': reference('RetryAfter', 'headers') }, content: jsonContent('Ready') },
    },
  })
}

function operation(method: Call['method'], path: Call['path'], rest: Json): Json {
  const call = CALLS.find(call => call.method === method && call.path === path)!
  const operationId = call.summary.toLowerCase().replaceAll(/ (\w)/g, (_, letter: string) => letter.toUpperCase())
  return { operationId, summary: call.summary, description: call.meaning, ...rest }
}

/** Every path of the table of calls must be here, and no other: the type says so. */
function pathsOf(paths: Record<Call['path'], Json>): Json {
  return paths
}

function problems(...statuses: (typeof PROBLEMS)[number]['status'][]): Json {
  return Object.fromEntries(statuses.map((status) => {
    const codes = PROBLEMS.filter(problem => problem.status === status)
    const headers: Json = {}
    if (status === 409 || status === 429 || status === 503) headers['Retry-After'] = reference('RetryAfter', 'headers')
    if (status === 401) headers['WWW-Authenticate'] = { schema: { type: 'string' } }
    return [status, {
      description: codes.map(({ code, meaning }) => `${code}: ${meaning}`).join(' '),
      ...(Object.keys(headers).length > 0 ? { headers } : {}),
      content: { 'application/problem+json': { schema: reference('Problem') } },
    }]
  }))
}

function submissionHeaders(more: string[]): Json {
  return Object.fromEntries([
    ['Location', reference('Location', 'headers')],
    ['Idempotency-Replayed', reference('IdempotencyReplayed', 'headers')],
    ...more.map(name => ['Preference-Applied', reference(name, 'headers')]),
  ])
}

function idParameter(description: string): Json {
  return { name: 'id', in: 'path', required: true, description, schema: { type: 'string', format: 'uuid' } }
}

function jsonContent(schema: string): Json {
  return { 'application/json': { schema: reference(schema) } }
}

function reference(name: string, kind: 'schemas' | 'headers' = 'schemas'): Json {
  return { $ref: `#/components/${kind}/${name}` }
}

function answerSchema(schema: z.ZodType): JsonSchema {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { target: 'draft-2020-12' })
  return rest
}
