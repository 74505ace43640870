import { expect, larkfold, test, visit } from './support/test'

const SCREENS: Record<string, { screens: string[], tokens: boolean }> = {
  technician: { screens: ['Bench', 'Readings', 'Intake'], tokens: false },
  advisor: { screens: ['Bench', 'Readings'], tokens: false },
  quality: { screens: ['Bench', 'Readings', 'Intake'], tokens: false },
  owner: { screens: ['Bench', 'Readings', 'Intake'], tokens: true },
}

for (const [role, { screens, tokens }] of Object.entries(SCREENS)) {
  test(`a person with the role ${role} finds ${screens.join(', ')} and Settings, and each opens`, async ({ page, demo, signedInAs, isMobile }) => {
    await signedInAs(larkfold(demo, role))
    await visit(page, '/bench')
    const nav = page.getByRole('navigation', { name: 'Screens' })
    await expect(nav.getByRole('link')).toHaveText([...screens, isMobile ? 'More' : 'Settings'])
    for (const screen of screens) {
      await nav.getByRole('link', { name: screen, exact: true }).click()
      await expect(page.getByRole('heading', { level: 1, name: screen === 'Bench' ? 'Today' : screen })).toBeVisible()
      await expect(nav.getByRole('link', { name: screen, exact: true })).toHaveAttribute('aria-current', 'page')
      await expect(page.getByRole('alert')).toHaveCount(0)
    }
    if (isMobile) {
      await nav.getByRole('link', { name: 'More' }).click()
      await page.getByRole('main').getByRole('link', { name: 'Settings' }).click()
    } else {
      await nav.getByRole('link', { name: 'Settings' }).click()
    }
    await expect(page.getByRole('heading', { level: 1, name: 'Settings' })).toBeVisible()
    await expect(page.getByRole('heading', { name: 'Where you are signed in' })).toBeVisible()
    await expect(page.getByRole('heading', { name: 'Device tokens' })).toHaveCount(tokens ? 1 : 0)
  })
}

test('a screen beyond the role says whom to ask, whatever the address', async ({ page, demo, signedInAs }) => {
  await signedInAs(larkfold(demo, 'advisor'))
  await visit(page, '/intake')
  await expect(page.getByRole('alert')).toContainText('role')
  await expect(page.getByRole('table')).toHaveCount(0)
})
