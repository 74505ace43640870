import { createHash, randomUUID } from 'node:crypto'
import { gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { readingsToCsv } from '#shared/intake/csv-write'
import { request, settled, signInAs, until } from '../support/client'
import { goodReading } from '../support/readings'
import { startSuite, type Suite } from '../support/suite'

let suite: Suite
beforeAll(async () => {
  suite = await startSuite()
})
afterAll(() => suite.stop())

const send = (json: unknown, headers: Record<string, string> = {}) => request(suite.server, '/api/v1/readings', { json, token: suite.a.token, headers })

describe('one reading', () => {
  it('is acknowledged with 202 and where to look, and becomes a reading with a verdict', async () => {
    const answer = await send(goodReading('one-1'))
    expect(answer.status).toBe(202)
    expect(answer.body.submission).toMatchObject({ status: 'received' })
    expect(answer.headers.get('location')).toBe(`/api/v1/submissions/${answer.body.submission.id}`)
    expect(await settled(suite.server, suite.a.token, answer.body.submission.id)).toMatchObject({ status: 'done', received: 1, accepted: 1, refused: 0 })
  })

  it('brings the verdict at once with Prefer: wait', async () => {
    const answer = await send(goodReading('one-2', { composition: { basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 94 }, { substance: 'HC', percent: 6 }] } }), { prefer: 'wait=5' })
    expect(answer.status).toBe(200)
    expect(answer.body.readings).toHaveLength(1)
    expect(answer.body.readings[0]).toMatchObject({ senderId: 'one-2', verdict: 'isolate-flammable' })
    expect(answer.body.readings[0].nextStep.length).toBeGreaterThan(10)
    expect(answer.body.readings[0].cautions.length).toBeGreaterThan(0)
  })

  it('sent again with the same content changes nothing; with other content it is a conflict that names the first', async () => {
    await send(goodReading('one-3'), { prefer: 'wait=5' })
    const same = await send(goodReading('one-3'), { prefer: 'wait=5' })
    expect(same.body.submission).toMatchObject({ accepted: 0, repeated: 1, refused: 0 })
    const other = await send(goodReading('one-3', { note: 'changed' }), { prefer: 'wait=5' })
    expect(other.body.submission).toMatchObject({ accepted: 0, repeated: 0, refused: 1 })
    expect(other.body.refused[0]).toMatchObject({ code: 'conflict', senderReadingId: 'one-3' })
    expect(other.body.refused[0].conflictingReadingId).toMatch(/^[0-9a-f-]{36}$/)
  })

  it('of another instrument than the token\'s is refused with the reason', async () => {
    const answer = await send(goodReading('one-4', { instrument: { serial: 'BT-999' } }), { prefer: 'wait=5' })
    expect(answer.body.refused[0]).toMatchObject({ code: 'instrument', pointer: '/instrument/serial', value: 'BT-999' })
  })
})

describe('many readings', () => {
  it('in one JSON body: a refused one never holds back its neighbours', async () => {
    const answer = await send({ readings: [goodReading('many-1'), 17, null, 'x', [], goodReading('many-2')] }, { prefer: 'wait=5' })
    expect(answer.body.submission).toMatchObject({ received: 6, accepted: 2, refused: 4 })
    expect(answer.body.refused.map((row: { ordinal: number, code: string }) => [row.ordinal, row.code])).toEqual([[2, 'type'], [3, 'type'], [4, 'type'], [5, 'type']])
  })

  it('as NDJSON, gzip and plain', async () => {
    const lines = (prefix: string) => `${JSON.stringify(goodReading(`${prefix}-1`))}\n\n{bad\n${JSON.stringify(goodReading(`${prefix}-2`))}`
    for (const [prefix, body, headers] of [
      ['nd', lines('nd'), {}],
      ['ndz', gzipSync(lines('ndz')), { 'content-encoding': 'gzip' }],
    ] as [string, string | Uint8Array, Record<string, string>][]) {
      const answer = await request(suite.server, '/api/v1/readings', { token: suite.a.token, body, headers: { 'content-type': 'application/x-ndjson', 'prefer': 'wait=5', ...headers } })
      expect(answer.status, prefix).toBe(200)
      expect(answer.body.submission, prefix).toMatchObject({ accepted: 2, refused: 1 })
      expect(answer.body.refused[0], prefix).toMatchObject({ line: 3, code: 'syntax' })
    }
  })

  it('as CSV, with the place of a refused cell', async () => {
    const csv = [...readingsToCsv(['csv-1', 'csv-2', 'csv-3'].map(id => ({ reading: goodReading(id) })))].join('').replace('csv-2,2026-03-14T09:26:53-05:00', 'csv-2,2026-02-30T09:26:53-05:00')
    const answer = await request(suite.server, '/api/v1/readings', { token: suite.a.token, body: csv, headers: { 'content-type': 'text/csv', 'prefer': 'wait=5' } })
    expect(answer.body.submission).toMatchObject({ accepted: 2, refused: 1 })
    expect(answer.body.refused[0]).toMatchObject({ line: 3, column: 'sampled_at', code: 'time' })
  })
})

describe('idempotency', () => {
  it('the same key and bytes give the first answer again; other bytes are refused with 422', async () => {
    const key = randomUUID()
    const first = await send(goodReading('key-1'), { 'idempotency-key': key })
    const again = await send(goodReading('key-1'), { 'idempotency-key': `"${key}"` })
    expect(again.status).toBe(first.status)
    expect(again.body).toEqual(first.body)
    expect(again.headers.get('idempotency-replayed')).toBe('true')
    const other = await send(goodReading('key-2'), { 'idempotency-key': key })
    expect(other.status).toBe(422)
    expect(other.headers.get('content-type')).toContain('application/problem+json')
    expect((await send(goodReading('key-3'), { 'idempotency-key': '' })).status).toBe(400)
  })

  it('fifty at the same instant store one', async () => {
    const key = randomUUID()
    const answers = await Promise.all(Array.from({ length: 50 }, () => send(goodReading('fifty'), { 'idempotency-key': key })))
    expect(new Set(answers.map(answer => answer.status))).toEqual(new Set([202]))
    expect(new Set(answers.map(answer => JSON.stringify(answer.body))).size).toBe(1)
    expect(answers.filter(answer => answer.headers.get('idempotency-replayed') !== 'true')).toHaveLength(1)
    expect((await suite.owner`select count(*)::int as n from submissions where idempotency_key = ${key}`)[0]!.n).toBe(1)
  })

  it('a waited answer is kept and given again', async () => {
    const key = randomUUID()
    const first = await send(goodReading('kept'), { 'idempotency-key': key, 'prefer': 'wait=5' })
    const again = await send(goodReading('kept'), { 'idempotency-key': key, 'prefer': 'wait=5' })
    expect(first.status).toBe(200)
    expect(again.body).toEqual(first.body)
  })

  it('the key of another organisation is another key', async () => {
    const key = randomUUID()
    await send(goodReading('own'), { 'idempotency-key': key })
    const other = await request(suite.server, '/api/v1/readings', { json: goodReading('own'), token: suite.b.token, headers: { 'idempotency-key': key } })
    expect(other.status).toBe(202)
    expect(other.headers.get('idempotency-replayed')).toBeNull()
  })
})

describe('the door', () => {
  const post = (body: string | Uint8Array, headers: Record<string, string>) => request(suite.server, '/api/v1/readings', { body, headers, token: suite.a.token })
  const json = { 'content-type': 'application/json' }
  const J = JSON.stringify(goodReading('door'))
  const cases: [string, string | Uint8Array, Record<string, string>, number, string][] = [
    ['J01 empty body', '', json, 400, 'empty'],
    ['J02 cut', '{"schema":', json, 400, 'syntax'],
    ['J03 something after', `${J}x`, json, 400, 'syntax'],
    ['J04 trailing comma', `${J.slice(0, -1)},}`, json, 400, 'syntax'],
    ['J06 NaN', J.replace('99.4', 'NaN'), json, 400, 'syntax'],
    ['J12 invalid UTF-8', Buffer.concat([Buffer.from('{"a":"'), Buffer.from([0xC3, 0x28]), Buffer.from('"}')]), json, 400, 'encoding'],
    ['J21 no readings', '{"readings":[]}', json, 400, 'empty'],
    ['J22 too many readings', `{"readings":[${Array.from({ length: 5001 }, () => '1').join(',')}]}`, json, 413, 'too-many-readings'],
    ['J24 text/plain', J, { 'content-type': 'text/plain' }, 415, 'media-type'],
    ['J24 application/xml', J, { 'content-type': 'application/xml' }, 415, 'media-type'],
    ['J25 over the limit', Buffer.alloc(8 * 1024 * 1024 + 1, 32), json, 413, 'too-large'],
    ['N07 gzip over plain bytes', J, { ...json, 'content-encoding': 'gzip' }, 400, 'gzip'],
    ['N08 br', J, { ...json, 'content-encoding': 'br' }, 415, 'content-encoding'],
    ['N06 inflates beyond the bound', gzipSync(Buffer.alloc(600 * 1024 * 1024, 32), { level: 1 }), { 'content-type': 'application/x-ndjson', 'content-encoding': 'gzip' }, 413, 'inflated-too-large'],
  ]
  for (const [name, body, headers, status, code] of cases) {
    it(`${name}: ${status}`, async () => {
      const before = await suite.owner`select count(*)::int as n from submissions`
      const answer = await post(body, headers)
      expect(answer.status).toBe(status)
      expect(answer.headers.get('content-type')).toContain('application/problem+json')
      expect(answer.body.type).toContain(code)
      expect(answer.body.title.length).toBeGreaterThan(3)
      expect(JSON.stringify(answer.body)).not.toMatch(/node_modules|select |at .*\.mjs/)
      expect((await suite.owner`select count(*)::int as n from submissions`)[0]!.n).toBe(before[0]!.n)
      const good = await send(goodReading(`after-${name}`), { prefer: 'wait=5' })
      expect(good.body.submission.accepted).toBe(1)
    })
  }

  it('J24 names what would do', async () => {
    expect((await post(J, { 'content-type': 'text/plain' })).headers.get('accept')).toContain('text/csv')
    expect((await post(J, { ...json, 'content-encoding': 'br' })).headers.get('accept-encoding')).toContain('gzip')
  })
})

describe('what was acknowledged', () => {
  it('can be fetched back byte for byte', async () => {
    const bytes = Buffer.from(` ${JSON.stringify(goodReading('bytes'))}\n `)
    const answer = await request(suite.server, '/api/v1/readings', { token: suite.a.token, body: bytes, headers: { 'content-type': 'application/json' } })
    const cookie = await signInAs(suite.server, suite.a.tag, 'quality')
    const response = await fetch(`${suite.server.baseUrl}/api/submissions/${answer.body.submission.id}/bytes`, { headers: { cookie } })
    const back = Buffer.from(await response.arrayBuffer())
    expect(createHash('sha256').update(back).digest('hex')).toBe(createHash('sha256').update(bytes).digest('hex'))
    expect(response.headers.get('content-disposition')).toMatch(/^attachment/)
  })
})

describe('tokens', () => {
  const from = (headers: Record<string, string>) => request(suite.server, '/api/v1/readings', { json: goodReading('token'), headers })
  it('T01–T04: missing, malformed, changed and unknown tokens are refused alike', async () => {
    const flipped = suite.a.token.slice(0, -8) + (suite.a.token.at(-8) === 'A' ? 'B' : 'A') + suite.a.token.slice(-7)
    const answers = [await from({}), await from({ authorization: 'Basic abc' }), await from({ authorization: 'Bearer ' }), await from({ authorization: `Bearer ${flipped}` })]
    for (const answer of answers) {
      expect(answer.status).toBe(401)
      expect(answer.headers.get('www-authenticate')).toContain('Bearer')
    }
    expect(new Set(answers.map(({ body }) => JSON.stringify({ ...body, requestId: '' }))).size).toBe(1)
    expect((await request(suite.server, `/api/v1/readings?token=${suite.a.token}`, { json: goodReading('token') })).status).toBe(401)
  })

  it('T03: a revoked token is refused at its next request', async () => {
    const owner = await signInAs(suite.server, suite.a.tag, 'owner')
    const made = await request(suite.server, '/api/tokens', { json: { name: 'short-lived', instrumentId: suite.a.instrumentId }, cookie: owner, headers: { 'sec-fetch-site': 'same-origin' } })
    expect(made.status).toBe(201)
    expect((await from({ authorization: `Bearer ${made.body.token}` })).status).toBe(202)
    await request(suite.server, `/api/tokens/${made.body.row.id}`, { method: 'DELETE', cookie: owner, headers: { 'sec-fetch-site': 'same-origin' } })
    expect((await from({ authorization: `Bearer ${made.body.token}` })).status).toBe(401)
  })

  it('T06: an intake token opens no list and no page', async () => {
    expect((await request(suite.server, '/api/v1/readings', { token: suite.a.token })).status).toBe(403)
    expect((await request(suite.server, '/api/bench', { token: suite.a.token })).status).toBe(401)
  })

  it('a token stands nowhere in the log', () => {
    expect(suite.server.logs()).not.toContain(suite.a.token)
  })
})

describe('a device that sends too much', () => {
  it('is told to slow down with 429 and Retry-After, and all that was acknowledged is stored', async () => {
    const { startServer } = await import('../support/server')
    const slow = await startServer({ databaseUrls: suite.database, env: { COLDSLIP_INTAKE_PER_MINUTE: '60' } })
    try {
      const answers = await Promise.all(Array.from({ length: 60 }, (_, i) => request(slow, '/api/v1/readings', { json: goodReading(`flood-${i}`), token: suite.b.token })))
      const taken = answers.filter(answer => answer.status === 202)
      const told = answers.filter(answer => answer.status === 429)
      expect(taken.length + told.length).toBe(60)
      expect(taken.length).toBeGreaterThanOrEqual(20)
      expect(told.length).toBeGreaterThan(10)
      expect(Number(told[0]!.headers.get('retry-after'))).toBeGreaterThanOrEqual(1)
      expect(told[0]!.body).toMatchObject({ retryable: true })
      const [stored] = await suite.owner`select count(*)::int as n from submissions where id = any(${taken.map(answer => answer.body.submission.id)}::uuid[])`
      expect(stored!.n).toBe(taken.length)
    } finally {
      await slow.stop()
    }
  })
})

describe('a delivery that can\'t be read as a whole', () => {
  it('C20: one row too many fails it with 0 readings, and says the limit', async () => {
    const row = [...readingsToCsv([{ reading: goodReading('row') }])].join('').trim().split(/\r?\n/)
    const body = gzipSync(`${row[0]}\n${Array.from({ length: 200_001 }, (_, i) => row[1]!.replace('row', `r${i}`)).join('\n')}`, { level: 1 })
    const answer = await request(suite.server, '/api/v1/readings', { token: suite.a.token, body, headers: { 'content-type': 'text/csv', 'content-encoding': 'gzip' } })
    expect(answer.status).toBe(202)
    const submission = await until(() => request(suite.server, `/api/v1/submissions/${answer.body.submission.id}`, { token: suite.a.token }), ({ body: { submission } }) => submission.status === 'failed', 55_000)
    expect(submission.body.submission).toMatchObject({ accepted: 0, failure: { code: 'too-many-rows' } })
    expect(submission.body.submission.failure.reason).toContain('200000')
  })
})
