import { request, type Page } from '@playwright/test'
import type { ReadingRow } from '#shared/api/readings'
import { allReadings, freshReading, idsOf, post, readingsTable, shownIds } from './support/readings'
import { answersToTaps, expect, larkfold, test, visit } from './support/test'

const PAGE = 50

const dayOf = (row: ReadingRow): string => new Intl.DateTimeFormat('en-CA', { timeZone: row.shop.timeZone }).format(new Date(row.sampledAt))

async function expectRows(page: Page, wanted: readonly ReadingRow[]): Promise<void> {
  if (wanted.length === 0) await expect(page.getByText('No reading fits these filters')).toBeVisible()
  else await expect.poll(() => shownIds(readingsTable(page))).toEqual(idsOf(wanted.slice(0, PAGE)))
}

async function openFilters(page: Page) {
  const button = page.getByRole('button', { name: /^Filters/ })
  if (await button.getAttribute('aria-expanded') === 'false') await button.click()
  return page.getByRole('search', { name: 'Filter readings' })
}

test.beforeEach(async ({ demo, signedInAs }) => signedInAs(larkfold(demo, 'owner')))

test.describe('filters, held against readings that were fetched without any', () => {
  const PERIOD = 30 * 86_400_000
  let all: ReadingRow[]

  test.beforeAll(async ({ demo, sessionOf }) => {
    const client = await request.newContext({ baseURL: process.env.BASE_URL, storageState: { cookies: await sessionOf(larkfold(demo, 'owner')), origins: [] } })
    all = await allReadings(client)
    await client.dispose()
  })

  const cases: { name: string, set: (page: Page) => Promise<(row: ReadingRow) => boolean> }[] = [
    {
      name: 'two verdicts',
      set: async (page) => {
        const form = await openFilters(page)
        await form.getByLabel('Isolate', { exact: true }).check()
        await form.getByLabel('Sample again').check()
        return row => ['isolate', 'sample-again'].includes(row.verdict)
      },
    },
    {
      name: 'declared refrigerant',
      set: async (page) => {
        await (await openFilters(page)).getByLabel('R-1234yf').check()
        return row => row.declared === 'R-1234yf'
      },
    },
    {
      name: 'shop and period, days as the shop counts them',
      set: async (page) => {
        const form = await openFilters(page)
        const last = Date.parse(all[0]!.sampledAt)
        const from = new Date(last - 2 * PERIOD).toISOString().slice(0, 10)
        const to = new Date(last - PERIOD).toISOString().slice(0, 10)
        await form.getByLabel('Larkfold Quarry Heights').check()
        await form.getByLabel('From').fill(from)
        await form.getByLabel('To, included').fill(to)
        return row => row.shop.name === 'Larkfold Quarry Heights' && dayOf(row) >= from && dayOf(row) <= to
      },
    },
    {
      name: 'instrument',
      set: async (page) => {
        await (await openFilters(page)).getByLabel('HB-1107').check()
        return row => row.instrument?.serial === 'HB-1107'
      },
    },
    {
      name: 'subject',
      set: async (page) => {
        const form = await openFilters(page)
        await form.getByLabel('Lot', { exact: true }).check()
        await form.getByLabel('Check standard').check()
        return row => ['lot', 'check'].includes(row.subject.kind)
      },
    },
    {
      name: 'batch',
      set: async (page) => {
        const { batch } = all.find(row => row.batch !== null)!
        const field = (await openFilters(page)).getByLabel('Batch')
        await field.fill(batch!)
        await field.press('Enter')
        return row => row.batch === batch
      },
    },
    {
      name: 'text that is part of a plate',
      set: async (page) => {
        const { label } = all.find(row => row.subject.plate !== null && row.subject.label === row.subject.plate)!.subject
        await page.getByRole('searchbox').fill(label.toLowerCase())
        return row => row.subject.plate === label
      },
    },
    {
      name: 'verdict, refrigerant, shop and subject at once',
      set: async (page) => {
        const form = await openFilters(page)
        await form.getByLabel('Isolate', { exact: true }).check()
        await form.getByLabel('R-134a', { exact: true }).check()
        await form.getByLabel('Larkfold Harbor Street').check()
        await form.getByLabel('Vehicle').check()
        return row => row.verdict === 'isolate' && row.declared === 'R-134a' && row.shop.name === 'Larkfold Harbor Street' && row.subject.kind === 'vehicle'
      },
    },
  ]

  for (const { name, set } of cases) {
    test(name, async ({ page, demo, another }) => {
      await visit(page, '/readings')
      await expectRows(page, all)
      const wanted = all.filter(await set(page))
      expect(wanted.length, 'the demo has some').toBeGreaterThan(0)
      await expectRows(page, wanted)

      // The address alone says what is shown: here after a reload, and in somebody else's browser.
      const address = page.url()
      expect(new URL(address).search).not.toBe('')
      await page.reload()
      await answersToTaps(page)
      await expectRows(page, wanted)
      const { page: other } = await another(larkfold(demo, 'quality'))
      await visit(other, address)
      await expectRows(other, wanted)

      await page.getByRole('link', { name: 'Clear all' }).click()
      await expectRows(page, all)
      await page.goBack()
      await expectRows(page, wanted)
    })
  }

  test('a filter is taken off by its chip, and nothing found is said plainly', async ({ page }) => {
    await visit(page, '/readings?verdict=isolate&subject=vehicle&text=zz-not-there')
    await expectRows(page, [])
    const chips = page.getByRole('list', { name: 'Filters that are set' })
    await chips.getByRole('button', { name: /zz-not-there/ }).click()
    await expectRows(page, all.filter(row => row.verdict === 'isolate' && row.subject.kind === 'vehicle'))
    await chips.getByRole('button', { name: /^Vehicle/ }).click()
    await expectRows(page, all.filter(row => row.verdict === 'isolate'))
    await expect(page).toHaveURL(/\/readings\?verdict=isolate$/)
  })

  test('the shop in view narrows every list', async ({ page }) => {
    await visit(page, '/readings')
    await page.getByLabel('Shop in view').filter({ visible: true }).selectOption('Larkfold Mill Road')
    await expectRows(page, all.filter(row => row.shop.name === 'Larkfold Mill Road'))
    await page.reload()
    await answersToTaps(page)
    await expectRows(page, all.filter(row => row.shop.name === 'Larkfold Mill Road'))
  })
})

test('older pages follow one another without a repeat or a gap, even while readings come in', async ({ page, demo, request: device }) => {
  const all = await allReadings(page.request)
  await visit(page, '/readings')
  const table = readingsTable(page)
  const older = page.getByRole('button', { name: 'Older readings' })
  for (const count of [2 * PAGE, 3 * PAGE]) {
    await older.click()
    await expect.poll(async () => (await shownIds(table)).length).toBe(count)
  }
  expect(await shownIds(table)).toEqual(idsOf(all.slice(0, 3 * PAGE)))

  // Read further down, the list holds still and counts what is new.
  await older.scrollIntoViewIfNeeded()
  const reading = freshReading(demo)
  expect(await post(device, demo.deviceToken, reading)).toBe(200)
  const news = page.getByRole('button', { name: '1 new' })
  await expect(news).toBeVisible()
  expect(await shownIds(table)).toEqual(idsOf(all.slice(0, 3 * PAGE)))
  await older.click()
  await expect.poll(async () => (await shownIds(table)).length).toBe(4 * PAGE)
  expect(await shownIds(table)).toEqual(idsOf(all.slice(0, 4 * PAGE)))
  await news.click()
  await expect(table.getByRole('row').nth(1)).toContainText(reading.subject.plate)
  expect((await shownIds(table)).slice(1)).toEqual(idsOf(all.slice(0, 4 * PAGE)))
})

test('the keyboard alone searches, walks, opens, closes and shows its keys', async ({ page }) => {
  await visit(page, '/bench')
  await page.keyboard.press('/')
  await expect(page).toHaveURL(/\/readings$/)
  await expect(page.getByRole('searchbox')).toBeFocused()
  await page.keyboard.type('LMR')
  await expect(page).toHaveURL(/text=LMR/)
  const table = readingsTable(page)
  await expect(table.getByRole('row').nth(1)).toContainText('LMR')
  await page.keyboard.press('Escape')

  const link = (index: number) => table.locator('a[data-row]').nth(index)
  await page.keyboard.press('j')
  await expect(link(0)).toBeFocused()
  await page.keyboard.press('j')
  await page.keyboard.press('ArrowDown')
  await expect(link(2)).toBeFocused()
  await page.keyboard.press('k')
  await expect(link(1)).toBeFocused()
  await page.keyboard.press('ArrowUp')
  await page.keyboard.press('ArrowUp')
  await expect(link(0)).toBeFocused()

  const [first, second] = await shownIds(table)
  await page.keyboard.press('Enter')
  const pane = page.getByRole('complementary', { name: 'The reading that is open' })
  await expect(pane.getByRole('heading', { level: 2 })).toBeVisible()
  await expect(page).toHaveURL(new RegExp(`open=${first}`))
  await page.keyboard.press('j')
  await page.keyboard.press('Enter')
  await expect(page).toHaveURL(new RegExp(`open=${second}`))
  await expect(pane).toContainText((await table.getByRole('row').nth(2).getByRole('cell').nth(2).innerText()).split('\n')[0]!)
  await page.keyboard.press('Escape')
  await expect(pane).toHaveCount(0)
  await expect(link(1)).toBeFocused()
  await expect(page).toHaveURL(/text=LMR$/)

  await page.keyboard.press('?')
  const keys = page.getByRole('dialog', { name: 'Keys' })
  await expect(keys).toBeVisible()
  await expect(keys).toContainText('Search readings')
  await page.keyboard.press('Escape')
  await expect(keys).toBeHidden()
})

test('the pane stands beside the list, keeps its place in the address and goes with the back button', async ({ page }) => {
  await visit(page, '/readings?verdict=isolate-flammable')
  const table = readingsTable(page)
  await table.getByRole('row').nth(1).getByRole('cell').nth(2).click()
  const pane = page.getByRole('complementary', { name: 'The reading that is open' })
  await expect(pane).toContainText('Isolate, flammable')
  await expect(table).toBeVisible()
  const asked: string[] = []
  page.on('request', one => asked.push(new URL(one.url()).pathname))
  await table.getByRole('row').nth(2).getByRole('cell').nth(2).click()
  await expect(page).toHaveURL(new RegExp(`open=${(await shownIds(table))[1]}`))
  await expect(pane.getByRole('heading', { level: 2 })).toBeVisible()
  expect(asked.filter(path => path === '/api/v1/readings'), 'the list is not asked for again').toEqual([])
  await page.reload()
  await answersToTaps(page)
  await expect(pane).toContainText('Isolate, flammable')
  await page.goBack()
  await page.goBack()
  await expect(pane).toHaveCount(0)
  await expect(page).toHaveURL(/verdict=isolate-flammable$/)
})
