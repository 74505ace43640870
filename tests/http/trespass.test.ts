import { readdirSync } from 'node:fs'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { ROUTES } from '#server/utils/routes'
import { request, signInAs } from '../support/client'
import { goodReading } from '../support/readings'
import { startSuite, type Suite } from '../support/suite'

let suite: Suite
const cookies: Record<string, string> = {}
/** Ids of organisation B, by the collection they belong to. */
const foreign: Record<string, string> = {}

beforeAll(async () => {
  suite = await startSuite()
  for (const role of ['technician', 'advisor', 'quality', 'owner']) cookies[role] = await signInAs(suite.server, 'a', role)
  const sent = await request(suite.server, '/api/v1/readings', { json: { readings: [goodReading('b-1', { note: 'secret of b' }), goodReading('b-2', { sampledAt: 'never' })] }, token: suite.b.token, headers: { prefer: 'wait=5' } })
  foreign.submissions = sent.body.submission.id
  foreign.readings = sent.body.readings[0].id
  await signInAs(suite.server, 'b', 'owner')
  foreign.certificates = (await request(suite.server, `/api/v1/readings/${foreign.readings}/certificate`, { method: 'POST', cookie: await signInAs(suite.server, 'b', 'quality'), headers: { 'sec-fetch-site': 'same-origin' } })).body.id
  foreign.sessions = (await suite.owner`select id from sessions where organisation_id = ${suite.b.organisationId} limit 1`)[0]!.id
  foreign.tokens = (await suite.owner`select id from device_tokens where organisation_id = ${suite.b.organisationId} limit 1`)[0]!.id
})
afterAll(() => suite.stop())

const UNKNOWN = '019b0000-0000-7000-8000-000000000000'

describe('another organisation\'s rows', () => {
  it('the table of routes is that of the files', () => {
    const files = readdirSync(new URL('../../server/api', import.meta.url), { recursive: true, encoding: 'utf8' })
      .filter(file => file.endsWith('.ts') && !file.includes('[...]'))
      .map((file) => {
        const [, path, method] = /^(.*)\.(get|post|put|patch|delete)\.ts$/.exec(file)!
        return `${method!.toUpperCase()} /api/${path!.replace(/(^|\/)index$/, '').replace(/\[(\w+)\]/g, ':$1')}`
      })
    expect(ROUTES.map(route => `${route.method} ${route.path}`).sort()).toEqual(files.sort())
  })

  // Generated from the routes: a new one with an id is tried without anybody thinking of it.
  for (const route of ROUTES.filter(route => route.path.includes(':id'))) {
    const collection = route.path.split('/').find(part => ['readings', 'submissions', 'sessions', 'tokens', 'certificates'].includes(part))!
    for (const caller of ['technician', 'advisor', 'quality', 'owner', 'device']) {
      it(`${route.method} ${route.path} as ${caller}: as if it did not exist`, async () => {
        const ask = async (id: string) => {
          const answer = await request(suite.server, route.path.replace(':id', id), {
            method: route.method,
            ...(caller === 'device' ? { token: suite.a.token } : { cookie: cookies[caller] }),
            headers: { 'sec-fetch-site': 'same-origin' },
            ...(route.method === 'POST' || route.method === 'PUT' ? { json: {} } : {}),
          })
          return { status: answer.status, body: { ...answer.body, requestId: '' } }
        }
        expect(foreign[collection], `an id of ${collection}`).toBeDefined()
        const theirs = await ask(foreign[collection]!)
        expect(theirs).toEqual(await ask(UNKNOWN))
        expect([401, 403, 404]).toContain(theirs.status)
        expect(JSON.stringify(theirs)).not.toContain('secret of b')
      })
    }
  }

  it('lists hold only one\'s own', async () => {
    for (const path of ['/api/v1/readings', '/api/bench', '/api/submissions', '/api/filters', '/api/sessions', '/api/tokens']) {
      const answer = await request(suite.server, path, { cookie: cookies.owner })
      expect(answer.status, path).toBe(200)
      for (const id of [...Object.values(foreign), suite.b.shopId, suite.b.instrumentId, 'secret of b']) expect(JSON.stringify(answer.body), path).not.toContain(id)
    }
  })

  it('filters with another organisation\'s ids find nothing', async () => {
    for (const query of [`shop=${suite.b.shopId}`, `instrument=${suite.b.instrumentId}`, `submission=${foreign.submissions}`, 'text=secret']) {
      const answer = await request(suite.server, `/api/v1/readings?${query}`, { cookie: cookies.owner })
      expect(answer.status, query).toBe(200)
      expect(answer.body.readings, query).toEqual([])
    }
    expect((await request(suite.server, `/api/bench?shop=${suite.b.shopId}`, { cookie: cookies.owner })).status).toBe(404)
  })

  it('everything untouched: the token, the session and the readings of B still work', async () => {
    expect((await suite.owner`select 1 from sessions where id = ${foreign.sessions!} and revoked_at is null`)).toHaveLength(1)
    expect((await suite.owner`select 1 from certificates where organisation_id = ${suite.b.organisationId} and withdrawn_at is null`)).toHaveLength(1)
    expect((await suite.owner`select 1 from device_tokens where id = ${foreign.tokens!} and revoked_at is null`)).toHaveLength(1)
    expect((await request(suite.server, `/api/v1/submissions/${foreign.submissions}`, { token: suite.b.token })).body.submission.accepted).toBe(1)
  })

  it('the live stream of A tells nothing of B', async () => {
    const abort = new AbortController()
    const response = await fetch(`${suite.server.baseUrl}/api/live`, { headers: { cookie: cookies.quality! }, signal: abort.signal })
    const reader = response.body!.getReader()
    const text = new TextDecoder()
    let seen = ''
    const reading = (async () => {
      for (;;) {
        const { value, done } = await reader.read()
        if (done) return
        seen += text.decode(value)
        if (seen.includes('event: readings') && seen.includes('"count":1')) return
      }
    })()
    await request(suite.server, '/api/v1/readings', { json: goodReading('b-live'), token: suite.b.token, headers: { prefer: 'wait=5' } })
    const mine = await request(suite.server, '/api/v1/readings', { json: goodReading('a-live'), token: suite.a.token, headers: { prefer: 'wait=5' } })
    await reading
    abort.abort()
    const submissionIds = [...seen.matchAll(/"submissionId":"([^"]+)"/g)].map(match => match[1])
    expect(new Set(submissionIds)).toEqual(new Set([mine.body.submission.id]))
  })
})

describe('roles', () => {
  it('each right belongs to its roles only', async () => {
    const expectations: [string, string, Record<string, number>][] = [
      ['GET', '/api/v1/readings', { technician: 200, advisor: 200, quality: 200, owner: 200 }],
      ['GET', '/api/submissions', { technician: 200, advisor: 403, quality: 200, owner: 200 }],
      ['GET', '/api/tokens', { technician: 403, advisor: 403, quality: 403, owner: 200 }],
    ]
    for (const [method, path, statuses] of expectations) {
      for (const [role, status] of Object.entries(statuses)) expect((await request(suite.server, path, { method, cookie: cookies[role] })).status, `${role} ${path}`).toBe(status)
    }
  })

  it('without a session everything but the public addresses is 401', async () => {
    const open = new Set(['GET /api/health', 'GET /api/ready', 'GET /api/demo', 'GET /api/verify/:code', 'POST /api/session'])
    for (const route of ROUTES) {
      if (open.has(`${route.method} ${route.path}`)) continue
      const answer = await request(suite.server, route.path.replace(':id', UNKNOWN), { method: route.method, ...(route.method === 'POST' ? { json: {} } : {}) })
      expect(answer.status, `${route.method} ${route.path}`).toBe(401)
    }
  })
})
