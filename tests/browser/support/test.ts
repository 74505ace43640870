import { readFileSync } from 'node:fs'
import { test as base, expect, request, type BrowserContext, type BrowserContextOptions, type Cookie, type Page } from '@playwright/test'
import { Watch } from './watch'

export { expect }

export interface Person { role: string, email: string, password: string, shop: string }

export interface Demo {
  baseUrl: string
  signIns: Person[]
  deviceToken: string
  instrumentSerial: string
}

export interface Opened { context: BrowserContext, page: Page }

interface Fixtures {
  watch: Watch
  /** Another browser with cookies of its own, watched like the first. */
  another: (person: Person | null, options?: BrowserContextOptions) => Promise<Opened>
  /** Puts a session of the person into the page's browser. */
  signedInAs: (person: Person) => Promise<void>
}

interface WorkerFixtures {
  demo: Demo
  sessionOf: (person: Person) => Promise<Cookie[]>
}

/** A fresh session, opened without a page. */
export async function openSession(person: Person, baseURL: string, userAgent?: string): Promise<Cookie[]> {
  const client = await request.newContext({ baseURL, extraHTTPHeaders: { 'sec-fetch-site': 'same-origin' }, userAgent })
  const answer = await client.post('/api/session', { data: { email: person.email, password: person.password } })
  expect(answer.status(), `${person.email} signs in`).toBe(200)
  const { cookies } = await client.storageState()
  await client.dispose()
  return cookies
}

export const test = base.extend<Fixtures, WorkerFixtures>({
  demo: [async ({}, use) => {
    await use(JSON.parse(readFileSync(process.env.DEMO_FILE!, 'utf8')) as Demo)
  }, { scope: 'worker' }],

  // One session a person and run: what is tested is the page, not scrypt.
  sessionOf: [async ({}, use) => {
    const known = new Map<string, Promise<Cookie[]>>()
    await use((person) => {
      const session = known.get(person.email) ?? openSession(person, process.env.BASE_URL!)
      known.set(person.email, session)
      return session
    })
  }, { scope: 'worker' }],

  watch: async ({}, use) => {
    const watch = new Watch(process.env.BASE_URL!)
    await use(watch)
    expect(watch.faults(), 'what the browser complained of').toEqual([])
  },

  baseURL: async ({}, use) => use(process.env.BASE_URL),

  context: async ({ context, watch }, use) => {
    await watch.over(context)
    await use(context)
  },

  another: async ({ browser, contextOptions, watch, sessionOf }, use) => {
    const opened: BrowserContext[] = []
    await use(async (person, options = {}) => {
      const context = await browser.newContext({ ...contextOptions, baseURL: process.env.BASE_URL, ...options })
      opened.push(context)
      await watch.over(context)
      if (person) await context.addCookies(await sessionOf(person))
      return { context, page: await context.newPage() }
    })
    for (const context of opened) await context.close()
  },

  signedInAs: async ({ context, sessionOf }, use) => {
    await use(async person => context.addCookies(await sessionOf(person)))
  },
})

/** The first demo person of the role in the group of three shops. */
export function larkfold(demo: Demo, role: string): Person {
  return demo.signIns.find(one => one.role === role && one.email.endsWith('@larkfold.example'))!
}

/** The owner of the other organisation. */
export function stranger(demo: Demo): Person {
  return demo.signIns.find(one => one.role === 'owner' && one.email.endsWith('@pinmoor.example'))!
}

/** Loads a page and waits until it answers to taps and keys. */
export async function visit(page: Page, path: string): Promise<void> {
  await page.goto(path)
  await answersToTaps(page)
}

export async function answersToTaps(page: Page): Promise<void> {
  await page.waitForFunction(() => (window as unknown as { useNuxtApp?: () => { isHydrating?: boolean } }).useNuxtApp?.().isHydrating === false)
}
