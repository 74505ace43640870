import type { ReadingDetail } from '#shared/api/readings'
import { freshReading, post, readingsTable } from './support/readings'
import { answersToTaps, expect, larkfold, test, visit } from './support/test'

test('what a device posts appears on the open bench and in the open list without a reload, and can be defended', async ({ page, demo, another, signedInAs, request }) => {
  const owner = larkfold(demo, 'owner')
  await signedInAs(owner)
  const { page: list } = await another(owner)
  await visit(page, '/bench')
  await visit(list, '/readings')
  const isolated = page.getByRole('link', { name: /^\d+ Isolate$/ })
  const before = Number((await isolated.innerText()).match(/\d+/)![0])
  for (const one of [page, list]) await one.evaluate(() => Object.assign(window, { sameDocument: true }))

  const reading = freshReading(demo, { note: 'seen by the browser test' })
  expect(await post(request, demo.deviceToken, reading)).toBe(200)

  const { plate } = reading.subject
  const latest = page.getByRole('table', { name: 'The latest readings, the newest first' })
  await expect(latest.getByRole('row').filter({ hasText: plate })).toContainText('Isolate')
  await expect(page.getByRole('table', { name: /^Isolate and flammable/ }).getByRole('row').filter({ hasText: plate })).toBeVisible()
  await expect(isolated).toContainText(String(before + 1))
  const row = readingsTable(list).getByRole('row').filter({ hasText: plate })
  await expect(row).toContainText('91.2')
  for (const one of [page, list]) expect(await one.evaluate(() => 'sameDocument' in window)).toBe(true)

  await latest.getByRole('row').filter({ hasText: plate }).getByRole('link').click()
  await expect(page).toHaveURL(/\/readings\/[0-9a-f-]{36}$/)
  await answersToTaps(page)
  const id = page.url().split('/').at(-1)!
  const detail = await (await page.request.get(`/api/v1/readings/${id}`)).json() as ReadingDetail
  const main = page.getByRole('main')

  await expect(page.getByRole('heading', { level: 1 })).toContainText(plate)
  await expect(main).toContainText('Isolate')
  await expect(main).toContainText(detail.words.nextStep)
  await expect(page.getByRole('region', { name: 'Cautions' }).getByRole('listitem')).toHaveCount(detail.words.cautions.length)

  const rules = page.getByRole('table', { name: 'Rules that looked at this reading' })
  await expect(rules.getByRole('row')).toHaveCount(detail.rules.length + 1)
  const purity = rules.getByRole('row').filter({ hasText: /^\s*Purity/ })
  for (const words of ['decided', 'Beyond', '91.2', '98.0', 'SAE J2099']) await expect(purity).toContainText(words)
  const foreign = rules.getByRole('row').filter({ hasText: 'Foreign refrigerant: R-22' })
  for (const words of ['Beyond', '8.8', '2.0']) await expect(foreign).toContainText(words)
  for (const rule of await rules.getByRole('rowheader').allInnerTexts()) expect(rule, 'each rule names its source').toMatch(/SAE|ISO|AHRI|practice|record/)

  const record = page.getByRole('region', { name: 'The record' })
  expect(detail.digest).toMatch(/^[0-9a-f]{64}$/)
  await expect(record).toContainText(detail.digest)
  await expect(record).toContainText('As received')
  await record.getByText('As reported, and as sent').click()
  expect(JSON.parse(await record.locator('pre').innerText())).toEqual(reading)
  await expect(main).toContainText('seen by the browser test')
})

test('a second, clean sample takes the vehicle off the alarms', async ({ page, demo, signedInAs, request }) => {
  await signedInAs(larkfold(demo, 'technician'))
  await visit(page, '/bench')
  const first = freshReading(demo)
  expect(await post(request, demo.deviceToken, first)).toBe(200)
  const alarms = page.getByRole('region', { name: 'Isolated, no clean sample since' })
  await expect(alarms).toContainText(first.subject.plate)
  for (let sample = 2; sample <= 4; sample++) {
    const clean = freshReading(demo, {
      subject: first.subject,
      composition: { ...first.composition, parts: [{ substance: 'R-134a', percent: 99.7 }, { substance: 'R-22', percent: 0.3 }] },
    })
    expect(await post(request, demo.deviceToken, clean)).toBe(200)
  }
  await expect(alarms).not.toContainText(first.subject.plate)
})
