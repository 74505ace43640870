import type { ReadingList } from '#shared/api/readings'
import { freshReading, post } from './support/readings'
import { answersToTaps, expect, larkfold, test, visit } from './support/test'

const FROST = { light: 'rgb(242, 246, 247)', dark: 'rgb(11, 20, 24)' }

test.beforeEach(async ({ demo, signedInAs }) => signedInAs(larkfold(demo, 'owner')))

test('the theme follows the system until the person chooses, and the choice is kept and drawn by the server', async ({ page }) => {
  const html = page.locator('html')
  await page.emulateMedia({ colorScheme: 'dark' })
  await visit(page, '/settings')
  await expect(html).toHaveCSS('background-color', FROST.dark)
  await page.getByLabel('Light').check()
  await expect(html).toHaveCSS('background-color', FROST.light)
  await page.reload({ waitUntil: 'commit' })
  await expect(html).toHaveAttribute('data-theme', 'light')
  expect(await (await page.request.get('/bench')).text()).toContain('data-theme="light"')
  await page.emulateMedia({ colorScheme: 'light' })
  await answersToTaps(page)
  await page.getByLabel('Dark').check()
  await visit(page, '/bench')
  await expect(html).toHaveCSS('background-color', FROST.dark)
  await visit(page, '/settings')
  await page.getByLabel('As the system').check()
  await expect(html).toHaveCSS('background-color', FROST.light)
})

for (const [wish, most] of [['reduce', 0.01], ['no-preference', 200]] as const) {
  test(`a row that comes in moves for at most ${most} ms where the person has ${wish === 'reduce' ? 'asked for less motion' : 'no wish'}`, async ({ page, demo, request }) => {
    await page.emulateMedia({ reducedMotion: wish })
    await visit(page, '/bench')
    const reading = freshReading(demo)
    expect(await post(request, demo.deviceToken, reading)).toBe(200)
    const row = page.getByRole('table', { name: 'The latest readings, the newest first' }).getByRole('row').filter({ hasText: reading.subject.plate })
    const milliseconds = await row.evaluate(element => parseFloat(getComputedStyle(element).animationDuration) * 1000)
    expect(milliseconds).toBeGreaterThan(0)
    expect(milliseconds).toBeLessThanOrEqual(most)
  })
}

test('on paper a reading stands alone: no navigation, no buttons, dark ink on white, the organisation named', async ({ page }) => {
  await page.emulateMedia({ colorScheme: 'dark' })
  const list = await (await page.request.get('/api/v1/readings', { params: { verdict: 'isolate', limit: 1 } })).json() as ReadingList
  await visit(page, `/readings/${list.readings[0]!.id}`)
  await page.emulateMedia({ media: 'print', colorScheme: 'dark' })
  for (const hidden of await page.locator('nav, header.rail, button, summary').all()) await expect(hidden).toBeHidden()
  await expect(page.getByText('Larkfold Auto Air (demo)').filter({ visible: true })).toHaveCount(1)
  await expect(page.locator('html')).toHaveCSS('background-color', 'rgb(255, 255, 255)')
  await expect(page.locator('html')).toHaveCSS('color', 'rgb(15, 28, 36)')
  await expect(page.getByText('Invented data.')).toBeVisible()
  for (const name of ['Cautions', 'Rule by rule', 'The sample', 'The record']) await expect(page.getByRole('heading', { name })).toBeVisible()
  expect((await page.pdf({ format: 'A4' })).subarray(0, 5).toString()).toBe('%PDF-')
})
