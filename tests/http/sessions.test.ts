import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PASSWORD } from '../support/organisation'
import { request, signInAs } from '../support/client'
import { startSuite, type Suite } from '../support/suite'

let suite: Suite
beforeAll(async () => {
  suite = await startSuite()
})
afterAll(() => suite.stop())

const own = { 'sec-fetch-site': 'same-origin' }
const signIn = (email: string, password: string, headers: Record<string, string> = own) => request(suite.server, '/api/session', { json: { email, password }, headers })

describe('sign-in', () => {
  it('opens a session that the server proves by a row, and tells who it is', async () => {
    const cookie = await signInAs(suite.server, 'a', 'quality')
    const answer = await request(suite.server, '/api/session', { cookie })
    expect(answer.body).toMatchObject({ person: { email: 'quality@a.example' }, organisation: { name: 'Organisation a' }, roles: ['quality'] })
    expect(answer.body.shops).toHaveLength(1)
  })

  it('answers the same for an unknown address and a wrong password', async () => {
    const unknown = await signIn('nobody@a.example', PASSWORD)
    const wrong = await signIn('quality@a.example', 'not the password at all')
    expect(unknown.status).toBe(401)
    expect({ ...unknown.body, requestId: '' }).toEqual({ ...wrong.body, requestId: '' })
  })

  it('is refused from another site, whatever the browser says or leaves out', async () => {
    for (const headers of [{ 'sec-fetch-site': 'cross-site' }, { 'sec-fetch-site': 'same-site' }, { origin: 'https://evil.example' }, {}] as Record<string, string>[]) {
      expect((await signIn('quality@a.example', PASSWORD, headers)).status, JSON.stringify(headers)).toBe(403)
    }
    expect((await signIn('quality@a.example', PASSWORD, { origin: suite.server.baseUrl })).status).toBe(200)
  })

  it('is throttled after wrong passwords for one account from one address, and other accounts still get in', async () => {
    const statuses: number[] = []
    for (let i = 0; i < 12; i++) statuses.push((await signIn('advisor@b.example', `wrong password number ${i}`)).status)
    expect(statuses.slice(0, 10)).toEqual(Array.from({ length: 10 }, () => 401))
    expect(statuses.slice(10)).toEqual([429, 429])
    expect((await signIn('owner@b.example', PASSWORD)).status).toBe(200)
  })
})

describe('the cookie', () => {
  it('opens nothing after sign-out, also when it was copied', async () => {
    const cookie = await signInAs(suite.server, 'a', 'owner')
    expect((await request(suite.server, '/api/bench', { cookie })).status).toBe(200)
    expect((await request(suite.server, '/api/session', { method: 'DELETE', cookie, headers: own })).status).toBe(200)
    expect((await request(suite.server, '/api/bench', { cookie })).status).toBe(401)
  })

  it('of a session that was ended from another browser opens nothing', async () => {
    const first = await signInAs(suite.server, 'a', 'owner')
    const second = await signInAs(suite.server, 'a', 'owner')
    const sessions = await request(suite.server, '/api/sessions', { cookie: second })
    const others = sessions.body.filter((session: { current: boolean }) => !session.current)
    for (const session of others) expect((await request(suite.server, `/api/sessions/${session.id}`, { method: 'DELETE', cookie: second, headers: own })).status).toBe(200)
    expect((await request(suite.server, '/api/bench', { cookie: first })).status).toBe(401)
    expect((await request(suite.server, '/api/bench', { cookie: second })).status).toBe(200)
  })

  it('is HttpOnly and SameSite=Lax, holds no name, and is not taken as a header', async () => {
    const answer = await signIn('technician@a.example', PASSWORD)
    const [set] = answer.headers.getSetCookie().filter(item => item.startsWith('coldslip-session='))
    expect(set).toMatch(/HttpOnly/i)
    expect(set).toMatch(/SameSite=Lax/i)
    const value = set!.split(';')[0]!.slice('coldslip-session='.length)
    expect(set).not.toContain('technician')
    expect((await request(suite.server, '/api/bench', { headers: { 'x-coldslip-session-session': decodeURIComponent(value) } })).status).toBe(401)
  })

  it('a changing request with it from another site changes nothing', async () => {
    const cookie = await signInAs(suite.server, 'a', 'owner')
    expect((await request(suite.server, '/api/session', { method: 'DELETE', cookie, headers: { 'sec-fetch-site': 'cross-site' } })).status).toBe(403)
    expect((await request(suite.server, '/api/bench', { cookie })).status).toBe(200)
  })

  it('of a disabled person opens nothing at the next request', async () => {
    const cookie = await signInAs(suite.server, 'b', 'technician')
    await suite.owner`update people set disabled_at = now() where email = 'technician@b.example'`
    expect((await request(suite.server, '/api/bench', { cookie })).status).toBe(401)
  })
})
