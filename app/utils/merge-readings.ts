import type { ReadingRow } from '#shared/api/readings'

export interface Merged {
  rows: ReadingRow[]
  /** Ids of rows that were not there before. */
  added: string[]
  /** More came in than the page holds: what lies between is not loaded, so the list begins anew. */
  gap: boolean
}

/**
 * Lays the newest page over the rows on the screen: new rows in their place by sampling time, changed
 * ones replaced, the rest kept. Both lists are newest first.
 */
export function mergeReadings(rows: readonly ReadingRow[], newest: readonly ReadingRow[], pageIsWhole: boolean): Merged {
  const known = new Set(rows.map(row => row.id))
  const added = newest.filter(row => !known.has(row.id)).map(row => row.id)
  const gap = rows.length > 0 && newest.length > 0 && added.length === newest.length && !pageIsWhole
  if (gap || rows.length === 0) return { rows: [...newest], added, gap }
  const fresh = new Map(newest.map(row => [row.id, row]))
  const kept = rows.filter(row => !fresh.has(row.id))
  const merged = [...newest, ...kept].sort((a, b) => Date.parse(b.sampledAt) - Date.parse(a.sampledAt) || (a.id < b.id ? 1 : a.id > b.id ? -1 : 0))
  return { rows: merged, added, gap: false }
}
