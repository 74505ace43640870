import type { Page } from '@playwright/test'
import { allReadings, freshReading, idsOf, post, readingsTable, shownIds } from './support/readings'
import { answersToTaps, expect, larkfold, stranger, test, visit } from './support/test'

/** Posts a reading with a new token of the other organisation's only instrument. */
async function theirReading(page: Page) {
  const { instruments: [instrument] } = await (await page.request.get('/api/filters')).json() as { instruments: { id: string, serial: string }[] }
  const made = await page.request.post('/api/tokens', { data: { name: 'Their bench', instrumentId: instrument!.id }, headers: { 'sec-fetch-site': 'same-origin' } })
  const { token } = await made.json() as { token: string }
  const reading = freshReading({ instrumentSerial: instrument!.serial })
  expect(await post(page.request, token, reading)).toBe(200)
  return reading
}

test('two organisations at once: neither sees a row, a name or a new reading of the other', async ({ page, demo, another, signedInAs, request, watch }) => {
  await signedInAs(larkfold(demo, 'owner'))
  const { page: theirs } = await another(stranger(demo))
  await Promise.all([visit(page, '/readings'), visit(theirs, '/readings')])
  const [ours, others] = await Promise.all([allReadings(page.request), allReadings(theirs.request)])
  expect(others.length).toBeGreaterThan(10)
  const foreign = new Set(idsOf(others))
  expect(idsOf(ours).filter(id => foreign.has(id))).toEqual([])
  await expect.poll(() => shownIds(readingsTable(theirs))).toEqual(idsOf(others).slice(0, 50))

  // Both have a cylinder of this name.
  await Promise.all([page.goto('/readings?text=RC-07'), theirs.goto('/readings?text=RC-07')])
  await Promise.all([answersToTaps(page), answersToTaps(theirs)])
  for (const [one, rows] of [[page, ours], [theirs, others]] as const) {
    const wanted = rows.filter(row => row.subject.label === 'RC-07')
    expect(wanted.length).toBeGreaterThan(2)
    await expect.poll(() => shownIds(readingsTable(one))).toEqual(idsOf(wanted).slice(0, 50))
  }

  for (const path of ['/bench', '/intake', '/settings']) {
    await Promise.all([visit(page, path), visit(theirs, path)])
    expect(await page.content(), path).not.toContain('Pinmoor')
    expect(await theirs.content(), path).not.toContain('Larkfold')
  }

  await Promise.all([visit(page, '/bench'), visit(theirs, '/bench')])
  const latest = (one: Page) => one.getByRole('table', { name: 'The latest readings, the newest first' })
  const before = await shownIds(latest(theirs))
  const told = await theirs.evaluateHandle(() => {
    const news: unknown[] = []
    const stream = new EventSource('/api/live')
    stream.addEventListener('readings', event => news.push(JSON.parse((event as MessageEvent<string>).data)))
    return new Promise<unknown[]>(resolve => stream.addEventListener('open', () => resolve(news)))
  })
  const reading = freshReading(demo)
  expect(await post(request, demo.deviceToken, reading)).toBe(200)
  await expect(latest(page)).toContainText(reading.subject.plate)
  // What is told comes in order: once their own reading is there, ours would have been.
  const own = await theirReading(theirs)
  await expect(latest(theirs)).toContainText(own.subject.plate)
  expect((await shownIds(latest(theirs))).slice(1)).toEqual(before.slice(0, 29))
  await expect.poll(() => told.jsonValue()).toHaveLength(1)
  await expect(latest(page)).not.toContainText(own.subject.plate)

  watch.awaits(/status of 404/)
  const answer = await theirs.goto(`/readings/${ours[0]!.id}`)
  expect(answer!.status()).toBe(404)
  await expect(theirs.getByRole('heading', { level: 1 })).toHaveText('There is no such page')
})
