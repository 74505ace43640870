import { describe, expect, it } from 'vitest'
import type { ReadingRow } from '../../../shared/api/readings'
import { mergeReadings } from '../../../app/utils/merge-readings'

const row = (id: string, minute: number, revision = 1) => ({ id, sampledAt: `2026-12-01T10:${String(minute).padStart(2, '0')}:00Z`, revision }) as ReadingRow
const ids = (rows: readonly ReadingRow[]) => rows.map(one => one.id)

describe('mergeReadings', () => {
  it('puts new rows first and keeps older pages', () => {
    const merged = mergeReadings([row('c', 3), row('b', 2), row('a', 1)], [row('d', 4), row('c', 3)], false)
    expect(ids(merged.rows)).toEqual(['d', 'c', 'b', 'a'])
    expect(merged.added).toEqual(['d'])
    expect(merged.gap).toBe(false)
  })

  it('puts a backlog in its place by sampling time', () => {
    const merged = mergeReadings([row('c', 30), row('a', 1)], [row('c', 30), row('b', 20), row('a', 1)], true)
    expect(ids(merged.rows)).toEqual(['c', 'b', 'a'])
  })

  it('takes over a corrected row', () => {
    const merged = mergeReadings([row('a', 1, 1)], [row('a', 1, 2)], true)
    expect(merged.rows[0]!.revision).toBe(2)
    expect(merged.added).toEqual([])
  })

  it('begins anew where more came in than a page holds', () => {
    const merged = mergeReadings([row('a', 1)], [row('z', 59), row('y', 58)], false)
    expect(ids(merged.rows)).toEqual(['z', 'y'])
    expect(merged.gap).toBe(true)
  })

  it('does not see a gap where the page is everything there is', () => {
    expect(ids(mergeReadings([row('a', 1)], [row('b', 2)], true).rows)).toEqual(['b', 'a'])
  })
})
