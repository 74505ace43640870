import { expect, test, visit } from './support/test'

test('the documentation opens signed out, its example can be posted as it stands, and leads to the machine-readable forms', async ({ page, demo, request }) => {
  await visit(page, '/docs/intake')
  await expect(page.getByRole('heading', { level: 1, name: 'Sending readings in' })).toBeVisible()
  await expect(page.getByRole('link', { name: 'Sign in' })).toBeVisible()

  const example = await page.locator('pre').first().innerText()
  const json = /<<'JSON'\n([\s\S]+)\nJSON$/.exec(example)![1]!
  const answer = await request.post('/api/v1/readings', { data: json, headers: { 'authorization': `Bearer ${demo.deviceToken}`, 'content-type': 'application/json' } })
  expect(answer.status()).toBe(202)
  const { submission } = await answer.json() as { submission: { id: string } }
  const outcome = async () => (await (await request.get(`/api/v1/submissions/${submission.id}`, { headers: { authorization: `Bearer ${demo.deviceToken}` } })).json()).submission
  await expect.poll(outcome).toMatchObject({ status: 'done', received: 1, refused: 0 })
  expect(example, 'the address is that of this server').toContain(`${new URL(page.url()).origin}/api/v1/readings`)

  const csv = await page.locator('.sample').filter({ hasText: 'A file' }).locator('pre').innerText()
  const file = await request.post('/api/v1/readings', { data: csv, headers: { 'authorization': `Bearer ${demo.deviceToken}`, 'content-type': 'text/csv', 'prefer': 'wait=5' } })
  expect((await file.json()).submission).toMatchObject({ received: 2, refused: 0 })

  for (const [name, path] of [['JSON Schema', '/schema/purity-reading.v1.json'], ['OpenAPI', '/openapi.json']] as const) {
    const link = page.getByRole('link', { name })
    await expect(link).toHaveAttribute('href', path)
    const found = await request.get(path)
    expect(found.status(), path).toBe(200)
    expect(await found.json(), path).toEqual(expect.any(Object))
  }

  // A refusal's `type` names a place on this page.
  const refused = await request.post('/api/v1/readings', { data: json, headers: { 'content-type': 'application/json' } })
  expect(refused.status()).toBe(401)
  const { type } = await refused.json() as { type: string }
  await visit(page, type)
  await expect(page.locator(`[id="${new URL(page.url()).hash.slice(1)}"]`)).toBeInViewport()
})
