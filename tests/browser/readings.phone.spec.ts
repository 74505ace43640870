import { readingsTable, shownIds } from './support/readings'
import { expect, larkfold, test, visit } from './support/test'

test.beforeEach(async ({ demo, signedInAs }) => signedInAs(larkfold(demo, 'technician')))

test('a tapped card opens the reading as a page of its own, and the back button returns to the filtered list', async ({ page }) => {
  await visit(page, '/readings')
  await page.getByRole('button', { name: 'Filters' }).tap()
  await page.getByRole('search').getByLabel('Isolate, flammable').check()
  await expect(page).toHaveURL(/verdict=isolate-flammable/)
  const card = readingsTable(page).getByRole('row').nth(1)
  await expect(card).toContainText('Isolate, flammable')
  const [id] = await shownIds(readingsTable(page))
  await card.tap()
  await expect(page).toHaveURL(new RegExp(`/readings/${id}$`))
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
  await expect(page.getByText('Keep every ordinary machine off')).toBeInViewport()
  await page.goBack()
  await expect(page).toHaveURL(/\/readings\?verdict=isolate-flammable/)
  await expect(card).toContainText('Isolate, flammable')
})

test('an address with an open pane leads to the page of that reading', async ({ page }) => {
  await visit(page, '/readings')
  const [id] = await shownIds(readingsTable(page))
  await page.goto(`/readings?open=${id}`)
  await expect(page).toHaveURL(new RegExp(`/readings/${id}$`))
})
