import AxeBuilder from '@axe-core/playwright'
import type { APIRequestContext, Page } from '@playwright/test'
import type { SubmissionList } from '#shared/api/intake'
import type { ReadingList } from '#shared/api/readings'
import type { VerdictKind } from '#shared/verdict/types'
import { expect, larkfold, test, visit } from './support/test'

interface Screen {
  name: string
  /** The address; what it needs is asked from the API. */
  path: (client: APIRequestContext) => Promise<string> | string
  signedOut?: boolean
  status?: number
  /** Where it is seen, if not everywhere. */
  only?: 'desktop' | 'phone'
  prepare?: (page: Page) => Promise<void>
}

async function readingWith(client: APIRequestContext, verdict: VerdictKind): Promise<string> {
  const list = await (await client.get('/api/v1/readings', { params: { verdict, limit: 1 } })).json() as ReadingList
  return list.readings[0]!.id
}

async function deliveryWith(client: APIRequestContext, status: 'done' | 'failed'): Promise<string> {
  const list = await (await client.get('/api/submissions', { params: { refused: 1 } })).json() as SubmissionList
  return `/intake/${list.submissions.find(one => one.status === status)!.id}`
}

const SCREENS: Screen[] = [
  { name: 'sign-in', path: () => '/sign-in', signedOut: true },
  { name: 'documentation', path: () => '/docs/intake', signedOut: true },
  { name: 'bench', path: () => '/bench' },
  { name: 'readings', path: () => '/readings' },
  { name: 'readings, filters open', path: () => '/readings?verdict=isolate&subject=vehicle', prepare: page => page.getByRole('button', { name: /^Filters/ }).click() },
  { name: 'readings, nothing found', path: () => '/readings?text=zz-not-there' },
  { name: 'readings, one open', only: 'desktop', path: async client => `/readings?open=${await readingWith(client, 'connect-purge-air')}`, prepare: page => page.locator('.reading-sheet').waitFor() },
  {
    name: 'reading, sample again, all unfolded',
    path: async client => `/readings/${await readingWith(client, 'sample-again')}`,
    prepare: async (page) => {
      for (const summary of await page.locator('summary').all()) await summary.click()
    },
  },
  { name: 'reading, flammable', path: async client => `/readings/${await readingWith(client, 'isolate-flammable')}` },
  { name: 'intake', path: () => '/intake' },
  { name: 'delivery with refused rows', path: client => deliveryWith(client, 'done') },
  { name: 'delivery that could not be read', path: client => deliveryWith(client, 'failed') },
  { name: 'settings', path: () => '/settings', prepare: page => page.getByRole('button', { name: /^Revoke/ }).first().waitFor() },
  { name: 'more', only: 'phone', path: () => '/more' },
  { name: 'keys', only: 'desktop', path: () => '/bench', prepare: page => page.keyboard.press('?') },
  { name: 'no such page', path: () => '/nowhere', status: 404 },
]

const RULES = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22a', 'wcag22aa']

/** Of all these rules only those on colour can come out differently in the other theme. */
const COLOUR_RULES = ['color-contrast', 'link-in-text-block']

/** Rows are all made by one template, and the first fifteen hold every verdict: the others would only take minutes. */
const LATER_ROWS = 'tbody tr:nth-child(n + 16)'

async function violations(page: Page, onlyColour = false): Promise<string[]> {
  const builder = new AxeBuilder({ page }).exclude(LATER_ROWS)
  const { violations: found } = await (onlyColour ? builder.withRules(COLOUR_RULES) : builder.withTags(RULES)).analyze()
  return found.flatMap(({ id, help, nodes }) => nodes.map(node => `${id} (${help}): ${node.target.join(' ')}`))
}

/** Controls that a gloved thumb must meet, with less than 44 px in height; links inside text are exempt (WCAG 2.2, 2.5.8). */
async function smallControls(page: Page): Promise<string[]> {
  return page.locator('button, select, summary, input, nav a, .button, .row-link').evaluateAll(elements => elements.flatMap((element) => {
    const target = element.matches('input[type=checkbox], input[type=radio]') ? element.closest('label')! : element.matches('.row-link') ? element.closest('tr')! : element
    const { width, height } = target.getBoundingClientRect()
    if (width === 0 || height === 0 || !target.checkVisibility() || height >= 44) return []
    return [`${Math.round(width)} × ${Math.round(height)}: ${target.outerHTML.slice(0, 120)}`]
  }))
}

/** By how much the page or a part that scrolls by itself can be moved sideways, and on a desk, where only parts scroll, the page down. */
async function overhang(page: Page) {
  return page.evaluate(() => {
    const { scrollWidth, clientWidth, scrollHeight, clientHeight } = document.documentElement
    const parts = [...document.querySelectorAll('.work, .list-side, .pane')].map(part => part.scrollWidth - part.clientWidth)
    return { sideways: Math.max(scrollWidth - clientWidth, ...parts), down: scrollHeight - clientHeight, shell: document.querySelector('.shell') !== null }
  })
}

for (const screen of SCREENS) {
  const tag = screen.only ? [`@${screen.only}`] : []
  test(`${screen.name}: nothing for axe in light and dark, nothing cut off, nothing too small to tap`, { tag }, async ({ page, demo, signedInAs, watch, isMobile }) => {
    if (!screen.signedOut) await signedInAs(larkfold(demo, 'owner'))
    if (screen.status) watch.awaits(new RegExp(`status of ${screen.status}`))
    await page.emulateMedia({ colorScheme: 'light' })
    await visit(page, await screen.path(page.request))
    await screen.prepare?.(page)

    expect(await violations(page), 'light').toEqual([])
    await page.emulateMedia({ colorScheme: 'dark' })
    await expect(page.locator('html')).toHaveCSS('background-color', 'rgb(11, 20, 24)')
    expect(await violations(page, true), 'dark').toEqual([])

    const { sideways, down, shell } = await overhang(page)
    expect(sideways, 'px beyond the right edge').toBe(0)
    if (isMobile) expect(await smallControls(page)).toEqual([])
    else if (shell) expect(down, 'px below the lower edge').toBe(0)
  })
}
