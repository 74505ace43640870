import { freshReading, post } from './support/readings'
import { expect, larkfold, openSession, test, visit } from './support/test'

test('a device token is made, shown once, used, revoked, and then opens nothing', async ({ page, demo, signedInAs, request }) => {
  await signedInAs(larkfold(demo, 'owner'))
  await visit(page, '/settings')
  const name = `Bench of test ${Date.now()}`
  await page.getByLabel('Name of the device').fill(name)
  await page.getByLabel('Instrument').selectOption({ label: 'HB-2047, Larkfold Harbor Street' })
  await page.getByRole('button', { name: 'Make a token' }).click()
  const shown = page.getByRole('status').filter({ hasText: name })
  const token = await shown.locator('code').innerText()
  expect(token).toMatch(/^coldslip_device_\w{30,}$/)

  const reading = freshReading(demo, { instrument: { serial: 'HB-2047' } })
  expect(await post(request, token, reading)).toBe(200)

  await shown.getByRole('button', { name: 'Done, hide it' }).click()
  await expect(page.getByText(token)).toHaveCount(0)
  await page.reload()
  expect(await page.content()).not.toContain(token)
  const row = page.getByRole('listitem').filter({ hasText: name })
  await expect(row).toContainText('Last used')

  await row.getByRole('button', { name: `Revoke ${name}` }).click()
  await row.getByRole('button', { name: 'Keep' }).click()
  expect(await post(request, token, freshReading(demo, { instrument: { serial: 'HB-2047' } }))).toBe(200)
  await row.getByRole('button', { name: `Revoke ${name}` }).click()
  await row.getByRole('button', { name: 'Revoke', exact: true }).click()
  await expect(row).toContainText('Revoked')
  expect(await post(request, token, freshReading(demo, { instrument: { serial: 'HB-2047' } }))).toBe(401)
})

test('a session that is ended elsewhere is over at the next step, and the sign-in page leads back', async ({ page, demo, another, signedInAs, watch, baseURL }) => {
  const person = larkfold(demo, 'quality')
  await signedInAs(person)
  const userAgent = 'Mozilla/5.0 (Windows NT 10.0; Win64; x64; rv:140.0) Gecko/20100101 Firefox/140.0'
  const { page: lost, context } = await another(null, { userAgent })
  await context.addCookies(await openSession(person, baseURL!, userAgent))
  await visit(lost, '/settings')

  await visit(page, '/settings')
  const row = page.getByRole('listitem').filter({ hasText: 'Firefox on Windows' })
  await row.getByRole('button', { name: /^End/ }).click()
  await expect(row).toHaveCount(0)

  watch.awaits(/status of 401/)
  await lost.getByRole('navigation', { name: 'Screens' }).getByRole('link', { name: 'Intake' }).click()
  await expect(lost).toHaveURL(/\/sign-in\?next=/)
  await expect(lost.getByRole('heading', { name: 'Sign in' })).toBeVisible()
  await expect(page.getByRole('heading', { level: 1, name: 'Settings' })).toBeVisible()
})
