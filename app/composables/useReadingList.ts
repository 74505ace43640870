import type { ReadingFilters, ReadingList, ReadingRow } from '#shared/api/readings'
import { filtersToQuery } from '~/utils/reading-filters'
import { mergeReadings } from '~/utils/merge-readings'

const PAGE = 50

/**
 * The rows of the results browser: the first page with the page itself, older ones on demand, new ones
 * as they come in. Rows that come in while the person reads further down are held back and counted.
 *
 * @param isReading true while the list is scrolled away from its top.
 */
export function useReadingList(filters: () => ReadingFilters, isReading: () => boolean) {
  const send = useSend()
  /** The same object while the filters are the same, so that opening the pane asks for nothing. */
  const query = computed<Record<string, string | string[]>>((before) => {
    const next = { ...filtersToQuery(filters()), limit: String(PAGE) }
    return before && JSON.stringify(before) === JSON.stringify(next) ? before : next
  })
  const { data: first, status, error, refresh } = useRead<ReadingList>('/api/v1/readings', { key: 'readings', query })

  /** What older pages and news have added to the first page; falls away when another first page comes. */
  const grown = shallowRef<{ first: ReadingList, rows: ReadingRow[], cursor: string | null } | null>(null)
  const current = computed(() => grown.value && grown.value.first === first.value ? grown.value : null)
  const rows = computed(() => current.value?.rows ?? first.value?.readings ?? [])
  const cursor = computed(() => current.value ? current.value.cursor : first.value?.nextCursor ?? null)
  const held = shallowRef<ReadingList | null>(null)
  const heldCount = ref(0)
  const freshIds = shallowRef<ReadonlySet<string>>(new Set())
  const loadingOlder = ref(false)
  const olderError = shallowRef<unknown>(null)

  function grow(next: ReadingRow[], nextCursor: string | null) {
    if (first.value) grown.value = { first: first.value, rows: next, cursor: nextCursor }
  }

  watch(first, () => {
    held.value = null
    heldCount.value = 0
    freshIds.value = new Set()
  })

  async function loadOlder() {
    if (!cursor.value || loadingOlder.value) return
    loadingOlder.value = true
    olderError.value = null
    const asked = query.value
    try {
      const list = await send<ReadingList>('/api/v1/readings', { query: { ...asked, cursor: cursor.value } })
      if (asked !== query.value) return
      const known = new Set(rows.value.map(row => row.id))
      grow([...rows.value, ...list.readings.filter(row => !known.has(row.id))], list.nextCursor)
    } catch (failure) {
      olderError.value = failure
    } finally {
      loadingOlder.value = false
    }
  }

  function take(list: ReadingList) {
    const merged = mergeReadings(rows.value, list.readings, list.nextCursor === null)
    grow(merged.rows, merged.gap ? list.nextCursor : cursor.value)
    freshIds.value = new Set(merged.added)
    held.value = null
    heldCount.value = 0
  }

  useLive(async () => {
    const asked = query.value
    const list = await send<ReadingList>('/api/v1/readings', { query: asked })
    if (asked !== query.value) return
    const known = new Set(rows.value.map(row => row.id))
    const added = list.readings.filter(row => !known.has(row.id)).length
    if (added > 0 && isReading()) {
      held.value = list
      heldCount.value = added
    } else {
      take(list)
    }
  })

  function showHeld() {
    if (held.value) take(held.value)
  }

  return { rows, cursor, status, error, refresh, loadOlder, loadingOlder, olderError, heldCount, showHeld, freshIds }
}
