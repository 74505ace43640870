import { execFile } from 'node:child_process'
import { generateKeyPairSync } from 'node:crypto'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { check } from '../../fixtures/certificates/check-certificate.mjs'
import { request, signInAs } from '../support/client'
import { readCode, readPdf } from '../support/pdf'
import { goodReading } from '../support/readings'
import { startServer } from '../support/server'
import { startSuite, type Suite } from '../support/suite'

const CHECKER = fileURLToPath(new URL('../../fixtures/certificates/check-certificate.mjs', import.meta.url))
const own = { 'sec-fetch-site': 'same-origin' }
const SECRETS = { plate: 'PRV 77X', vin: '1M8GDM9AXKP042788', workOrder: 'WO-9091', operator: 'Ottoline Quist' }

let suite: Suite
const cookies: Record<string, string> = {}
let count = 0

beforeAll(async () => {
  suite = await startSuite()
  for (const role of ['technician', 'quality', 'owner']) cookies[role] = await signInAs(suite.server, 'a', role)
})
afterAll(() => suite.stop())

async function newReading(over: Parameters<typeof goodReading>[1] = {}): Promise<string> {
  const sent = await request(suite.server, '/api/v1/readings', { json: goodReading(`certificate-${++count}`, over), token: suite.a.token, headers: { prefer: 'wait=9' } })
  expect(sent.status, JSON.stringify(sent.body)).toBe(200)
  return sent.body.readings[0].id
}

const privateReading = () => newReading({ subject: { kind: 'vehicle', plate: SECRETS.plate, vin: SECRETS.vin, workOrder: SECRETS.workOrder }, operator: SECRETS.operator, note: 'told us in confidence' })
const issue = (id: string, cookie = cookies.technician) => request(suite.server, `/api/v1/readings/${id}/certificate`, { method: 'POST', cookie, headers: own })
const verify = (code: string) => request(suite.server, `/api/verify/${code}`)
const withdraw = (id: string, reason: unknown, cookie = cookies.quality) => request(suite.server, `/api/certificates/${id}/withdraw`, { json: { reason }, cookie, headers: own })

async function pdfOf(id: string, format = ''): Promise<Uint8Array> {
  const answer = await fetch(`${suite.server.baseUrl}/api/v1/readings/${id}/certificate.pdf${format && `?format=${format}`}`, { headers: { cookie: cookies.technician! } })
  expect(answer.status).toBe(200)
  expect(answer.headers.get('content-type')).toBe('application/pdf')
  return new Uint8Array(await answer.arrayBuffer())
}

async function textOf(path: string): Promise<string> {
  return (await fetch(suite.server.baseUrl + path, { headers: { cookie: cookies.technician! } })).text()
}

const flat = (text: string) => text.replace(/\s+/g, '')

describe('issuing', () => {
  it('is a step of its own: reading never does it, and the answer says how', async () => {
    const id = await newReading()
    for (const kind of ['pdf', 'json']) {
      const answer = await request(suite.server, `/api/v1/readings/${id}/certificate.${kind}`, { cookie: cookies.owner })
      expect(answer.status).toBe(404)
      expect(answer.body).toMatchObject({ type: '/docs/intake#problem-no-certificate', status: 404 })
      expect(answer.body.detail).toContain('POST')
    }
    expect(await suite.owner`select 1 from certificates where reading_id = ${id}`).toHaveLength(0)
    expect((await issue(id)).status).toBe(201)
    const again = await issue(id, cookies.owner)
    expect(again.status).toBe(200)
    expect(await suite.owner`select 1 from certificates where reading_id = ${id}`).toHaveLength(1)
  })

  it('gives each shop its own numbers without a gap, when twenty are issued at once and some twice', async () => {
    const ids = await Promise.all(Array.from({ length: 20 }, (_, index) => newReading({ sampledAt: `2026-03-15T09:${10 + index}:00-05:00` })))
    const issued = await Promise.all([...ids, ...ids.slice(0, 5)].map(id => issue(id)))
    expect(issued.map(({ status }) => status).filter(status => status === 201)).toHaveLength(20)
    const rows = await suite.owner<{ number: number }[]>`select number from certificates where organisation_id = ${suite.a.organisationId} order by number`
    expect(rows.map(({ number }) => number)).toEqual(Array.from({ length: rows.length }, (_, index) => index + 1))
    expect(rows.length).toBeGreaterThanOrEqual(20)
    const [counter] = await suite.owner`select last_number from certificate_counters where organisation_id = ${suite.a.organisationId}`
    expect(counter!.last_number).toBe(rows.length)
    const events = await suite.owner<{ detail: { number: number } }[]>`select detail from audit_events where organisation_id = ${suite.a.organisationId} and action = 'certificate.issued' order by sequence`
    expect(events.map(({ detail }) => detail.number)).toEqual(rows.map(({ number }) => number))
  })

  it('takes a token that sends and reads, no other, and no request from another site', async () => {
    const id = await newReading()
    expect((await request(suite.server, `/api/v1/readings/${id}/certificate`, { method: 'POST', token: suite.a.token })).status).toBe(403)
    expect((await request(suite.server, `/api/v1/readings/${id}/certificate`, { method: 'POST', cookie: cookies.owner, headers: { 'sec-fetch-site': 'cross-site' } })).status).toBe(403)
    const made = await request(suite.server, '/api/tokens', { json: { name: 'both', instrumentId: suite.a.instrumentId, scopes: ['intake', 'read'] }, cookie: cookies.owner, headers: own })
    const issued = await request(suite.server, `/api/v1/readings/${id}/certificate`, { method: 'POST', token: made.body.token })
    expect(issued.status).toBe(201)
    expect(issued.body.issuedBy).toBe('Device token both')
    expect((await request(suite.server, `/api/v1/readings/${id}/certificate.pdf`, { token: made.body.token })).status).toBe(200)
  })

  it('is refused with a clear problem where the installation has no key, and all else works', async () => {
    const id = await newReading()
    const keyless = await startServer({ databaseUrls: suite.database, env: { COLDSLIP_SIGNING_KEY: '' } })
    try {
      const answer = await request(keyless, `/api/v1/readings/${id}/certificate`, { method: 'POST', cookie: cookies.owner, headers: own })
      expect(answer.status).toBe(503)
      expect(answer.body.detail).toContain('COLDSLIP_SIGNING_KEY')
      expect((await request(keyless, `/api/v1/readings/${id}`, { cookie: cookies.owner })).status).toBe(200)
      expect((await request(keyless, '/.well-known/coldslip-keys.json')).body).toEqual({ keys: [] })
    } finally {
      await keyless.stop()
    }
    const next = await issue(id)
    const [most] = await suite.owner`select count(*)::int as n, max(number) as most from certificates where organisation_id = ${suite.a.organisationId}`
    expect(next.body.number).toBe(most!.n)
    expect(most!.most).toBe(most!.n)
  })
})

describe('the PDF', () => {
  it('holds number, verdict words, limits, instrument, technician, work order, vehicle, cautions, digest and what it does not show', async () => {
    const id = await privateReading()
    const { body: row } = await issue(id)
    const { body: reading } = await request(suite.server, `/api/v1/readings/${id}`, { cookie: cookies.owner })
    const { text, title, width, height } = await readPdf(await pdfOf(id))
    expect([Math.round(width), Math.round(height)]).toEqual([595, 842])
    expect(title).toBe(`Certificate ${row.number}, Shop a`)
    const squeezed = flat(text)
    for (const words of [
      `No. ${row.number}`, reading.words.tag, reading.words.nextStep, reading.words.reason, ...reading.words.cautions, reading.digest, `audit chain ${reading.auditSequence}`,
      SECRETS.plate, SECRETS.vin, SECRETS.workOrder, SECRETS.operator, 'technician a', 'BT-1', 'Invented bench unit', '31 Dec 2089', 'In date when sampled',
      'What this does not show', 'Moisture, oil', reading.limitSet.name, ...reading.rules.map((rule: any) => rule.words.title), ...reading.rules.map((rule: any) => rule.words.source),
      'R-134a', 'Hydrocarbons', '99.4', 'at least 98.0', `${suite.server.baseUrl}/verify/${row.code}`, `${suite.server.baseUrl}/.well-known/coldslip-keys.json`,
    ]) expect(squeezed, words).toContain(flat(words))
    expect(text).not.toContain('Invented demo data')
    expect(text).not.toMatch(/\bis pure\b(?!, or)|WITHDRAWN/)
  })

  it('carries a QR code that, read off the drawn page, leads to the public page', async () => {
    const id = await newReading()
    const { body: row } = await issue(id)
    for (const format of ['a4', 'letter']) expect(await readCode(await pdfOf(id, format)), format).toBe(`${suite.server.baseUrl}/verify/${row.code}`)
  })

  it('comes on Letter too, is the same to the last byte each time, and embeds its fonts', async () => {
    const id = await newReading()
    await issue(id)
    const letter = await pdfOf(id, 'letter')
    const { width, height } = await readPdf(letter)
    expect([width, height]).toEqual([612, 792])
    expect(Buffer.from(await pdfOf(id, 'letter')).equals(Buffer.from(letter))).toBe(true)
    const source = Buffer.from(letter).toString('latin1')
    const described = source.match(/\/Type \/FontDescriptor/g)!.length
    expect(source.match(/\/FontFile[23] /g)).toHaveLength(described)
    expect(described).toBeGreaterThanOrEqual(3)
    expect(source).not.toMatch(/\/BaseFont \/(Helvetica|Times|Courier)/)
    expect((await request(suite.server, `/api/v1/readings/${id}/certificate.pdf?format=a3`, { cookie: cookies.owner })).status).toBe(400)
  })

  it('says in an organisation of invented data that it is invented', async () => {
    const id = await newReading()
    await suite.owner`update organisations set demo = true where organisation_id = ${suite.a.organisationId}`
    try {
      await issue(id)
    } finally {
      await suite.owner`update organisations set demo = false where organisation_id = ${suite.a.organisationId}`
    }
    expect((await readPdf(await pdfOf(id))).text).toContain('Invented demo data')
  })
})

describe('the signature', () => {
  it('is found genuine by the stand-alone checker with the published keys, and false after one bit of any byte was turned', async () => {
    const id = await privateReading()
    await issue(id)
    const certificate = await textOf(`/api/v1/readings/${id}/certificate.json`)
    const keys = await textOf('/.well-known/coldslip-keys.json')
    const statement = check(certificate, keys)
    expect(statement).toMatchObject({ schema: 'coldslip-certificate/1', subject: { vin: SECRETS.vin }, reading: { id } })

    const bytes = Buffer.from(certificate)
    const passed: number[] = []
    for (let at = 0; at < bytes.length; at++) {
      const bit = 1 << at % 7
      bytes[at]! ^= bit
      try {
        // A last digit that no double can tell, or the case of an exponent, changes nothing that is stated.
        expect(check(bytes.toString('utf8'), keys)).toEqual(statement)
        passed.push(at)
      } catch (error) {
        if ((error as Error).name === 'AssertionError') throw error
      }
      bytes[at]! ^= bit
      // The server closes connections that say nothing for long.
      if (at % 500 === 0) await new Promise(setImmediate)
    }
    expect(passed.length).toBeLessThan(bytes.length / 1000)
    const signature = JSON.parse(certificate).signature.value
    const from = certificate.lastIndexOf(signature)
    expect(passed.filter(at => at >= from && at < from + signature.length)).toEqual([])
  })

  it('is false for every member of the statement that says something else, is missing or added', async () => {
    const id = await privateReading()
    await issue(id)
    const certificate = await textOf(`/api/v1/readings/${id}/certificate.json`)
    const keys = await textOf('/.well-known/coldslip-keys.json')
    const places: { holder: any, name: string | number }[] = []
    const whole = JSON.parse(certificate)
    const visit = (holder: any) => {
      for (const name of Object.keys(holder)) {
        places.push({ holder, name })
        if (holder[name] !== null && typeof holder[name] === 'object') visit(holder[name])
      }
    }
    visit(whole.statement)
    expect(places.length).toBeGreaterThan(150)
    for (const { holder, name } of places) {
      const value = holder[name]
      holder[name] = typeof value === 'number' ? value + 1 : typeof value === 'string' ? `${value} ` : typeof value === 'boolean' ? !value : 0
      expect(() => check(JSON.stringify(whole), keys), String(name)).toThrow()
      holder[name] = value
    }
    delete whole.statement.operator
    expect(() => check(JSON.stringify(whole), keys)).toThrow()
    whole.statement.operator = SECRETS.operator
    expect(() => check(JSON.stringify(whole), keys)).not.toThrow()
    expect(() => check(certificate.replace('{"statement":{', '{"statement":{"demo":true,'), keys)).toThrow('twice')
    const { x } = generateKeyPairSync('ed25519').publicKey.export({ format: 'jwk' })
    const [key] = JSON.parse(keys).keys
    expect(() => check(certificate, JSON.stringify({ keys: [{ ...key, x }] }))).toThrow('does not fit its id')
    expect(() => check(certificate, JSON.stringify({ keys: [] }))).toThrow('not among the public keys')
  })

  it('the checker, run as anybody runs it, prints genuine and ends with 0, or false and ends with 1', async () => {
    const id = await newReading()
    const { body: row } = await issue(id)
    const folder = await mkdtemp(join(tmpdir(), 'coldslip-check-'))
    try {
      const certificate = await textOf(`/api/v1/readings/${id}/certificate.json`)
      await writeFile(join(folder, 'good.json'), certificate)
      await writeFile(join(folder, 'bad.json'), certificate.replace('"purityPercent":99.4', '"purityPercent":99.5'))
      await writeFile(join(folder, 'keys.json'), await textOf('/.well-known/coldslip-keys.json'))
      const run = (file: string) => new Promise<{ code: number, out: string }>((resolve) => {
        execFile(process.execPath, [CHECKER, file, 'keys.json'], { cwd: folder }, (error, out) => resolve({ code: Number(error?.code ?? 0), out }))
      })
      expect(await run('good.json')).toEqual({ code: 0, out: `genuine: certificate No. ${row.number} of Shop a, code ${row.code}\n` })
      expect(await run('bad.json')).toEqual({ code: 1, out: 'false: the signature does not fit the statement\n' })
    } finally {
      await rm(folder, { recursive: true })
    }
  })

  it('made with a former key stays in the list of keys', async () => {
    const id = await newReading()
    await issue(id)
    const certificate = await textOf(`/api/v1/readings/${id}/certificate.json`)
    const former = JSON.parse(await textOf('/.well-known/coldslip-keys.json')).keys[0]
    const newKey = generateKeyPairSync('ed25519').privateKey.export({ format: 'pem', type: 'pkcs8' }) as string
    const server = await startServer({ databaseUrls: suite.database, env: { COLDSLIP_SIGNING_KEY: newKey, COLDSLIP_SIGNING_OLD_PUBLIC_KEYS: former.x } })
    try {
      const { body: keys } = await request(server, '/.well-known/coldslip-keys.json')
      expect(keys.keys).toHaveLength(2)
      expect(keys.keys[1]).toEqual(former)
      expect(() => check(certificate, JSON.stringify(keys))).not.toThrow()
    } finally {
      await server.stop()
    }
  })
})

describe('the public page', () => {
  it('shows that a certificate is genuine, and nothing private, to somebody who is not signed in', async () => {
    const id = await privateReading()
    const { body: row } = await issue(id)
    const { body: reading } = await request(suite.server, `/api/v1/readings/${id}`, { cookie: cookies.owner })
    const answer = await verify(row.code)
    expect(answer.status).toBe(200)
    expect(answer.body).toEqual({
      state: 'genuine', code: row.code, number: row.number, shop: 'Shop a', demo: false, issuedOn: expect.stringMatching(/^\d{4}-\d\d-\d\d$/), sampledOn: '2026-03-14', withdrawnOn: null,
      verdict: reading.verdict, declared: 'R-134a', digest: reading.digest,
    })
    const page = await request<string>(suite.server, `/verify/${row.code}`)
    expect(page.status).toBe(200)
    expect(page.body).toContain('Genuine')
    expect(page.body).toContain(reading.digest)
    for (const shown of [JSON.stringify(answer.body), page.body]) {
      for (const secret of [...Object.values(SECRETS), 'in confidence', 'technician a', suite.a.organisationId, suite.a.shopId, id, 'BT-1']) expect(shown, secret).not.toContain(secret)
    }
  })

  it('takes the code as people type it, and knows no other', async () => {
    const id = await newReading()
    const { body: row } = await issue(id)
    expect(row.code).toMatch(/^[2-9A-HJ-NP-Z]{16}$/)
    expect((await verify(encodeURIComponent(row.code.toLowerCase().replace(/(.{4})/g, '$1- ')))).body.state).toBe('genuine')
    const other = row.code.slice(0, -1) + (row.code.endsWith('2') ? '3' : '2')
    for (const code of [other, 'x', '%00', encodeURIComponent('\' or 1=1 --'), row.id]) expect((await verify(code)).status, code).toBe(404)
    const page = await request<string>(suite.server, `/verify/${other}`)
    expect(page.status).toBe(404)
    expect(page.body).toContain('No certificate has this code')
  })

  it('shows that one was withdrawn, with the day and without the reason, which the organisation keeps', async () => {
    const id = await newReading()
    const { body: row } = await issue(id)
    expect((await withdraw(row.id, 'Plate of another car', cookies.technician)).status).toBe(403)
    expect((await withdraw(row.id, ' ')).status).toBe(422)
    expect((await withdraw(row.id, 'Plate of another car')).status).toBe(200)
    expect((await withdraw(row.id, 'Once more')).status).toBe(422)
    const answer = await verify(row.code)
    expect(answer.body).toMatchObject({ state: 'withdrawn', withdrawnOn: expect.stringMatching(/^\d{4}-/) })
    const page = await request<string>(suite.server, `/verify/${row.code}`)
    expect(page.body).toContain('Withdrawn')
    expect(page.body + JSON.stringify(answer.body)).not.toContain('another car')
    const { body: rows } = await request(suite.server, `/api/readings/${id}/certificates`, { cookie: cookies.technician })
    expect(rows[0]).toMatchObject({ state: 'withdrawn', withdrawn: { by: 'quality a', reason: 'Plate of another car' } })
    expect((await readPdf(await pdfOf(id))).text).toContain('WITHDRAWN')
    expect((await issue(id)).status).toBe(422)
    expect(await suite.owner`select 1 from audit_events where entity_id = ${row.id} and action = 'certificate.withdrawn' and detail->>'reason' = 'Plate of another car'`).toHaveLength(1)
  })

  it('shows that one was superseded when its reading has a newer revision; the next gets the next number', async () => {
    const id = await newReading()
    const { body: first } = await issue(id)
    await suite.owner`update readings set revision = 2 where id = ${id}`
    expect((await verify(first.code)).body.state).toBe('superseded')
    expect((await request<string>(suite.server, `/verify/${first.code}`)).body).toContain('Superseded')
    expect((await request(suite.server, `/api/v1/readings/${id}/certificate.pdf`, { cookie: cookies.owner })).status).toBe(404)
    const second = await issue(id)
    expect(second.status).toBe(201)
    expect(second.body).toMatchObject({ number: first.number + 1, readingRevision: 2, state: 'genuine' })
    expect((await verify(second.body.code)).body.state).toBe('genuine')
    expect((await verify(first.code)).body.state).toBe('superseded')
  })
})
