import { answersToTaps, expect, larkfold, test, visit } from './support/test'

test('one tap on a demo role leads to the bench', async ({ page }) => {
  await visit(page, '/sign-in')
  await page.getByRole('button', { name: /^Shop owner.*all shops/ }).click()
  await expect(page).toHaveURL(/\/bench$/)
  await expect(page.getByRole('heading', { level: 1, name: 'Today' })).toBeVisible()
  await expect(page.getByText('Invented data.')).toBeVisible()
})

test('a typed sign-in says what is wrong, then leads to where the person wanted to go, and out again', async ({ page, demo, watch }) => {
  const person = larkfold(demo, 'quality')
  await visit(page, '/readings?verdict=isolate')
  await expect(page).toHaveURL(/\/sign-in\?next=/)

  await page.getByLabel('E-mail address').fill(person.email)
  await page.getByLabel('Password').fill('not the password')
  watch.awaits(/status of 401/)
  await page.getByLabel('Password').press('Enter')
  await expect(page.getByRole('alert')).toContainText('The address or the password is wrong.')
  await expect(page.getByLabel('Password')).toHaveValue('')
  await expect(page.getByLabel('E-mail address')).toHaveValue(person.email)

  await page.getByLabel('Password').fill(person.password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await expect(page).toHaveURL(/\/readings\?verdict=isolate$/)
  await expect(page.getByRole('heading', { level: 1, name: 'Readings' })).toBeVisible()

  // Who is signed in already has no business on the sign-in page.
  await visit(page, '/sign-in')
  await expect(page).toHaveURL(/\/bench$/)

  await visit(page, '/settings')
  await page.getByRole('button', { name: 'Sign out' }).click()
  await expect(page).toHaveURL(/\/sign-in$/)
  await visit(page, '/bench')
  await expect(page).toHaveURL(/\/sign-in\?next=\/bench$/)
})

test('the way back after signing in never leaves this site', async ({ page, demo, signedInAs, baseURL }) => {
  await signedInAs(larkfold(demo, 'owner'))
  for (const wish of ['//elsewhere.example/', 'https://elsewhere.example/', '/\\elsewhere.example', '/%09/elsewhere.example', 'javascript:alert(1)', '/sign-in']) {
    await page.goto(`/sign-in?next=${encodeURIComponent(wish).replace('%2509', '%09')}`)
    await expect(page, wish).toHaveURL(`${baseURL}/bench`)
  }
  await page.goto(`/sign-in?next=${encodeURIComponent('/readings?subject=lot')}`)
  await expect(page).toHaveURL(`${baseURL}/readings?subject=lot`)
})

test('every screen that needs an account leads to the sign-in page and nothing of it is sent', async ({ page, request }) => {
  for (const path of ['/', '/bench', '/readings', '/readings/0190f3a2-0000-7000-8000-000000000000', '/intake', '/settings', '/more']) {
    const answer = await request.get(path, { maxRedirects: 0 })
    expect(answer.status(), path).toBe(302)
    expect(answer.headers().location, path).toMatch(/^\/sign-in/)
    expect(await answer.text(), path).not.toContain('Larkfold')
  }
  await visit(page, '/settings')
  await expect(page.getByRole('heading', { name: 'Sign in' })).toBeVisible()
})

test('a page that does not exist says so', async ({ page, demo, signedInAs, watch }) => {
  await signedInAs(larkfold(demo, 'owner'))
  watch.awaits(/status of 404/)
  const answer = await page.goto('/nowhere')
  expect(answer!.status()).toBe(404)
  await answersToTaps(page)
  await page.getByRole('link', { name: 'To the bench' }).click()
  await expect(page).toHaveURL(/\/bench$/)
})
