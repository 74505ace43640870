import { request as httpRequest } from 'node:http'
import Ajv2020 from 'ajv/dist/2020'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { request, signInAs, until } from '../support/client'
import { goodReading } from '../support/readings'
import { startSuite, type Suite } from '../support/suite'

let suite: Suite
let cookie: string

/** 130 readings over ten days: every tenth with R-22, every thirteenth R-1234yf, two batches, cylinders among them. */
const at = (i: number) => new Date(Date.UTC(2026, 4, 1, 15) + i * 2 * 3_600_000)
const many = Array.from({ length: 130 }, (_, i) => goodReading(`list-${i}`, {
  sampledAt: at(i).toISOString(),
  subject: i % 9 === 0 ? { kind: 'cylinder', tag: `RC-${i % 3}` } : { kind: 'vehicle', plate: `LST ${i}`, workOrder: `WO-${i}` },
  declared: i % 13 === 0 ? 'R-1234yf' : 'R-134a',
  batch: i < 65 ? 'first' : 'second',
  note: i === 77 ? 'smelled of 100 %_solvent\\' : '',
  composition: {
    basis: 'mass', air: 'apart', resolution: 0.1, airPercent: 0.5,
    parts: i % 10 === 0
      ? [{ substance: i % 13 === 0 ? 'R-1234yf' : 'R-134a', percent: 90 }, { substance: 'R-22', percent: 10 }]
      : [{ substance: i % 13 === 0 ? 'R-1234yf' : 'R-134a', percent: 99.9 }, { substance: 'HC', percent: 0.1 }],
  },
}))

beforeAll(async () => {
  suite = await startSuite()
  cookie = await signInAs(suite.server, 'a', 'quality')
  const answer = await request(suite.server, '/api/v1/readings', { json: { readings: many }, token: suite.a.token, headers: { prefer: 'wait=10' } })
  expect(answer.body.submission).toMatchObject({ accepted: 130, refused: 0 })
})
afterAll(() => suite.stop())

const list = (query: string) => request(suite.server, `/api/v1/readings?${query}`, { cookie })

async function allPages(query: string): Promise<any[]> {
  const rows: any[] = []
  for (let cursor: string | null = '', pages = 0; cursor !== null; pages++) {
    expect(pages).toBeLessThan(60)
    const answer = await list(`${query}&limit=7${cursor ? `&cursor=${cursor}` : ''}`)
    expect(answer.status).toBe(200)
    rows.push(...answer.body.readings)
    cursor = answer.body.nextCursor
  }
  return rows
}

describe('the results browser', () => {
  it('pages through everything, newest first, without a gap or a repeat, also while new readings come in', async () => {
    const first = await list('limit=50')
    await request(suite.server, '/api/v1/readings', { json: goodReading('meanwhile', { sampledAt: '2026-06-01T00:00:00Z', subject: { kind: 'vehicle', plate: 'NEW 1' } }), token: suite.a.token, headers: { prefer: 'wait=5' } })
    const second = await list(`limit=50&cursor=${first.body.nextCursor}`)
    const ids = [...first.body.readings, ...second.body.readings].map(row => row.sampledAt)
    expect(ids).toEqual(many.map(reading => reading.sampledAt).sort().reverse().slice(0, 100).map(time => new Date(time).toISOString()))
    const all = await allPages('batch=first')
    expect(new Set(all.map(row => row.id)).size).toBe(65)
  })

  it('filters alone and combined', async () => {
    const expectations: [string, (i: number) => boolean][] = [
      ['verdict=isolate', i => i % 10 === 0],
      ['verdict=isolate&verdict=connect&batch=first', i => i < 65],
      ['declared=R-1234yf', i => i % 13 === 0],
      ['subject=cylinder', i => i % 9 === 0],
      ['subject=cylinder&verdict=isolate&batch=second', i => i >= 65 && i % 90 === 0],
      [`shop=${suite.a.shopId}&declared=R-1234yf&batch=second`, i => i >= 65 && i % 13 === 0],
      [`instrument=${suite.a.instrumentId}&verdict=isolate`, i => i % 10 === 0],
      ['text=wo-77', i => i === 77],
      ['text=lst%2077', i => i === 77],
      ['text=lst77', i => i === 77],
      ['text=rc-1', i => i % 9 === 0 && i % 3 === 1],
      ['text=100%20%25_solvent%5C', i => i === 77],
      ['text=%25', i => i === 77],
      ['text=_', i => i === 77],
      [`text=${encodeURIComponent('\'; drop table readings; --')}`, () => false],
      // Days are the shop's: 2026-05-02 in Chicago runs from 05:00 UTC to 05:00 UTC.
      ['from=2026-05-02&to=2026-05-02', i => at(i) >= new Date('2026-05-02T05:00:00Z') && at(i) < new Date('2026-05-03T05:00:00Z')],
    ]
    for (const [query, wanted] of expectations) {
      const rows = await allPages(query)
      const expected = many.filter((_, i) => wanted(i)).map(reading => new Date(reading.sampledAt).toISOString()).sort().reverse()
      expect(rows.filter(row => row.subject.label !== 'NEW 1').map(row => row.sampledAt), query).toEqual(expected)
    }
  })

  it('refuses what is no filter, limit or cursor, and says what', async () => {
    for (const query of ['limit=0', 'limit=-1', 'limit=1e9', 'limit=abc', 'limit=2147483648', 'verdict=fine', 'declared=R134a', 'from=yesterday', 'shop=1', 'colour=red', `text=${'x'.repeat(10_000)}`, 'cursor=abc']) {
      const answer = await list(query)
      expect(answer.status, query).toBe(400)
      expect(answer.body.errors[0].parameter, query).toBe(query.split('=')[0])
    }
    const { body } = await list('limit=5')
    expect((await list(`limit=5&verdict=isolate&cursor=${body.nextCursor}`)).status).toBe(400)
    expect((await list(`limit=5&cursor=${body.nextCursor.slice(0, -4)}`)).status).toBe(400)
  })

  it('addresses that are no reading are not there', async () => {
    for (const id of ['not-a-uuid', '%00', '%ff', '..%2f..%2fetc', '019b0000-0000-7000-8000-000000000000', '00000000-0000-4000-8000-000000000000']) {
      const answer = await request(suite.server, `/api/v1/readings/${id}`, { cookie })
      expect([400, 404], id).toContain(answer.status)
    }
  })

  it('another method is refused with those that are possible', async () => {
    const answer = await request(suite.server, '/api/v1/readings', { method: 'PUT', json: {}, cookie, headers: { 'sec-fetch-site': 'same-origin' } })
    expect(answer.status).toBe(405)
    expect(answer.headers.get('allow')!.split(', ').sort()).toEqual(['GET', 'POST'])
  })
})

describe('one reading', () => {
  it('shows measured, uncertainty, limit, outcome and source for each rule, the raw record and its digest', async () => {
    const [row] = (await list('text=wo-10&verdict=isolate')).body.readings
    const { body } = await request(suite.server, `/api/v1/readings/${row.id}`, { cookie })
    expect(body).toMatchObject({ verdict: 'isolate', decidedBy: 'purity', attempt: 1, revision: 1, limitSet: { version: 1 } })
    expect(JSON.parse(body.raw)).toEqual(many.find(reading => reading.id === body.senderReadingId))
    const purity = body.rules.find((rule: any) => rule.rule === 'purity')
    expect(purity).toMatchObject({ measured: 90, limit: 98, outcome: 'fail' })
    expect(purity.uncertainty).toBeGreaterThan(0.29)
    expect(purity.words.source).toContain('SAE J2099')
    for (const rule of body.rules) {
      expect(rule.words.source.length, rule.rule).toBeGreaterThan(5)
      expect(['verified', 'from memory', 'common practice, no source']).toContain(rule.words.mark)
    }
    expect(body.words.cautions.join(' ')).toContain('Moisture and oil were not measured')
    expect(JSON.stringify(body.words)).not.toMatch(/\bpure\b|meets/i)
    expect(body.digest).toMatch(/^[0-9a-f]{64}$/)
  })

  it('a second sample that agrees settles "sample again", and both are kept and counted', async () => {
    const doubtful = (id: string, minute: number) => goodReading(id, {
      sampledAt: `2026-07-01T10:0${minute}:00-05:00`, subject: { kind: 'vehicle', plate: 'TWICE 1' },
      composition: { basis: 'mass', air: 'apart', resolution: 0.1, parts: [{ substance: 'R-134a', percent: 98.2 }, { substance: 'R-22', percent: 1.8 }] },
    })
    const first = await request(suite.server, '/api/v1/readings', { json: doubtful('twice-1', 0), token: suite.a.token, headers: { prefer: 'wait=5' } })
    expect(first.body.readings[0].verdict).toBe('sample-again')
    const second = await request(suite.server, '/api/v1/readings', { json: doubtful('twice-2', 8), token: suite.a.token, headers: { prefer: 'wait=5' } })
    expect(second.body.readings[0].verdict).toBe('connect')
    const { body } = await request(suite.server, `/api/v1/readings/${second.body.readings[0].id}`, { cookie })
    expect(body.attempt).toBe(2)
    expect(body.samples.map((sample: any) => sample.id)).toContain(first.body.readings[0].id)
  })
})

describe('the published contract', () => {
  it('accepts what the server accepts', async () => {
    const schema = await request(suite.server, '/schema/purity-reading.v1.json')
    expect(schema.status).toBe(200)
    const validate = new Ajv2020({ strict: false, validateFormats: false }).compile(schema.body)
    for (const reading of many.slice(0, 20)) expect(validate(reading), JSON.stringify(validate.errors)).toBe(true)
    expect(validate({ ...many[0], surprise: 1 })).toBe(false)
  })

  it('names every address of the public API, and only those', async () => {
    const { body } = await request(suite.server, '/openapi.json')
    expect(body.openapi).toMatch(/^3\.1/)
    for (const path of ['/api/v1/readings', '/api/v1/readings/{id}', '/api/v1/submissions/{id}', '/api/health', '/api/ready']) expect(Object.keys(body.paths)).toContain(path)
  })
})

describe('a sender that goes away', () => {
  it('in the middle of its body leaves nothing, and the whole sent again is taken once', async () => {
    const body = many.slice(0, 40).map(reading => JSON.stringify({ ...reading, id: `cut-${reading.id}` })).join('\n')
    const before = (await suite.owner`select count(*)::int as n from submissions`)[0]!.n
    await new Promise<void>((resolve) => {
      const cut = httpRequest(`${suite.server.baseUrl}/api/v1/readings`, { method: 'POST', headers: { 'authorization': `Bearer ${suite.a.token}`, 'content-type': 'application/x-ndjson', 'content-length': Buffer.byteLength(body) } })
      cut.on('error', () => resolve())
      cut.write(body.slice(0, Math.floor(body.length * 0.6)), () => cut.destroy())
      cut.on('close', () => resolve())
    })
    const answer = await request(suite.server, '/api/v1/readings', { body, token: suite.a.token, headers: { 'content-type': 'application/x-ndjson', 'prefer': 'wait=5' } })
    expect(answer.body.submission).toMatchObject({ accepted: 40, repeated: 0 })
    await until(() => suite.owner`select count(*)::int as n from submissions`, rows => rows[0]!.n === before + 1)
  })
})
