import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import type { Page } from '@playwright/test'
import type { SubmissionDetail } from '#shared/api/intake'
import { answersToTaps, expect, larkfold, test, visit } from './support/test'

/** Goes from the list of deliveries to the first with this status, as a person would. */
async function openDelivery(page: Page, status: string): Promise<SubmissionDetail> {
  await visit(page, '/intake')
  await page.getByRole('link', { name: 'With something refused' }).click()
  const row = page.getByRole('row').filter({ hasText: status }).filter({ hasText: 'Larkfold Mill Road' })
  await row.getByRole('link').click()
  await expect(page).toHaveURL(/\/intake\/[0-9a-f-]{36}$/)
  await answersToTaps(page)
  return await (await page.request.get(`/api/submissions/${page.url().split('/').at(-1)}`)).json() as SubmissionDetail
}

async function downloadedBytes(page: Page): Promise<Buffer> {
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'The bytes as sent' }).click()])
  return readFile(await download.path())
}

test.beforeEach(async ({ demo, signedInAs }) => signedInAs(larkfold(demo, 'quality')))

test('a file with refused rows shows for each the line, the column, what stood there, why, and the mend', async ({ page }) => {
  const submission = await openDelivery(page, 'Some refused')
  const refused = page.getByRole('region', { name: 'Refused records' })
  await expect(refused.getByRole('listitem')).toHaveCount(submission.refusedRows.length)
  expect(submission.refused).toBe(8)

  const bytes = await downloadedBytes(page)
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  await expect(page.getByRole('region', { name: 'As it was sent' })).toContainText(sha256)

  // What is shown is held against the file itself.
  const lines = bytes.toString('utf8').split('\r\n')
  const wrong: [column: string, value: string][] = [['declared', 'R134a'], ['r134a_pct', '99,7'], ['ambient_c', '95'], ['subject_kind', 'car']]
  for (const [column, value] of wrong) {
    const line = lines.findIndex(text => text.includes(value === '99,7' ? '"99,7"' : `,${value},`)) + 1
    const item = refused.getByRole('listitem').filter({ hasText: `Line ${line}, ${column}` })
    await expect(item.getByRole('code'), `${column} ${value}`).toHaveText(value)
    const row = submission.refusedRows.find(one => one.line === line)!
    for (const words of [row.reason, row.mend]) {
      expect(words.length).toBeGreaterThan(10)
      await expect(item).toContainText(words)
    }
  }

  await page.getByRole('link', { name: 'The readings of this delivery' }).click()
  await expect(page.getByRole('table', { name: 'Readings, the newest first' }).locator('a[data-row]')).toHaveCount(submission.accepted)
})

test('a file that cannot be read says why and what to do, and its bytes are kept', async ({ page }) => {
  const submission = await openDelivery(page, 'Could not be read')
  await expect(page.getByRole('main')).toContainText('The whole could not be read')
  await expect(page.getByRole('main')).toContainText(submission.failure!.reason)
  expect(submission.failure!.reason).toContain('declared')
  const bytes = await downloadedBytes(page)
  await expect(page.getByRole('region', { name: 'As it was sent' })).toContainText(createHash('sha256').update(bytes).digest('hex'))
})
