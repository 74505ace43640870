import { randomUUID } from 'node:crypto'
import type { APIRequestContext, Locator, Page } from '@playwright/test'
import type { ReadingList, ReadingRow } from '#shared/api/readings'
import { READING_SCHEMA, type PurityReading } from '#shared/intake/reading-schema'
import { expect, type Demo } from './test'

/** Every reading that the signed-in person may see, newest first, read page by page without any filter. */
export async function allReadings(client: APIRequestContext): Promise<ReadingRow[]> {
  const rows: ReadingRow[] = []
  let cursor: string | null = null
  do {
    const answer = await client.get('/api/v1/readings', { params: { limit: 200, ...(cursor ? { cursor } : {}) } })
    expect(answer.status()).toBe(200)
    const list = await answer.json() as ReadingList
    rows.push(...list.readings)
    cursor = list.nextCursor
  } while (cursor)
  return rows
}

export const idsOf = (rows: readonly ReadingRow[]): string[] => rows.map(row => row.id)

/** The list of the results browser. */
export function readingsTable(page: Page): Locator {
  return page.getByRole('table', { name: 'Readings, the newest first' })
}

/** Ids of the readings that a table shows, in its order. */
export function shownIds(table: Locator): Promise<string[]> {
  return table.locator('a[data-row]').evaluateAll(links => links.map(link => link.getAttribute('href')!.split('/').at(-1)!))
}

/** A reading of a vehicle that nobody has met before, sampled now by the demo's bench device. */
export function freshReading({ instrumentSerial }: Pick<Demo, 'instrumentSerial'>, over: Partial<PurityReading> = {}): PurityReading & { subject: { plate: string } } {
  const id = randomUUID()
  return {
    schema: READING_SCHEMA,
    id,
    sampledAt: new Date().toISOString(),
    instrument: { serial: instrumentSerial },
    subject: { kind: 'vehicle', plate: `TRY ${id.slice(0, 6).toUpperCase()}` },
    declared: 'R-134a',
    composition: {
      basis: 'mass', air: 'apart', resolution: 0.1,
      parts: [{ substance: 'R-134a', percent: 91.2 }, { substance: 'R-22', percent: 8.8 }],
      airPercent: 0.4,
    },
    conditions: { ambientCelsius: 21 },
    ...over,
  } as PurityReading & { subject: { plate: string } }
}

/** Posts as a device does that waits for its next step, so that one post is judged before the next one comes. @returns the answer's status. */
export async function post(client: APIRequestContext, token: string, reading: PurityReading): Promise<number> {
  const answer = await client.post('/api/v1/readings', { data: reading, headers: { authorization: `Bearer ${token}`, prefer: 'wait=10' } })
  return answer.status()
}
