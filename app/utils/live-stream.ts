/** What the server tells of new readings: ids only. */
export interface ReadingsNews {
  submissionId: string
  /** At most 50. */
  readingIds: string[]
  count: number
}

export type NewsListener = (news: ReadingsNews | 'caught-up') => void

/** Waits between tries after the server refused the stream, in milliseconds. */
const PATIENCE = [2_000, 5_000, 15_000, 60_000] as const

/**
 * One event stream for the whole page, open while somebody listens. The browser takes a broken stream
 * up again by itself; a refused one is tried again with growing patience. After every gap listeners
 * hear `caught-up`, since what was told meanwhile is gone.
 */
export function createLiveStream(path: string) {
  const listeners = new Set<NewsListener>()
  let source: EventSource | null = null
  let retry: ReturnType<typeof setTimeout> | undefined
  let refusals = 0
  // Between the making of the page and the first opening lies a gap too.
  let gap = true

  function tell(news: ReadingsNews | 'caught-up') {
    for (const listener of listeners) listener(news)
  }

  function open() {
    source = new EventSource(path)
    source.addEventListener('open', () => {
      refusals = 0
      if (gap) tell('caught-up')
      gap = false
    })
    source.addEventListener('readings', event => tell(JSON.parse((event as MessageEvent<string>).data) as ReadingsNews))
    source.addEventListener('error', () => {
      gap = true
      if (source?.readyState !== EventSource.CLOSED) return
      close()
      retry = setTimeout(open, PATIENCE[Math.min(refusals++, PATIENCE.length - 1)])
    })
  }

  function close() {
    clearTimeout(retry)
    source?.close()
    source = null
  }

  return {
    /** @returns to stop listening. */
    listen(listener: NewsListener): () => void {
      listeners.add(listener)
      if (listeners.size === 1) open()
      return () => {
        listeners.delete(listener)
        if (listeners.size === 0) close()
      }
    },
  }
}
