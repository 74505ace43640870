import type { createLiveStream } from '~/utils/live-stream'

/** A burst of news is one refresh: the first after this wait takes everything in. */
const GATHER_MILLISECONDS = 250

/** Calls `refresh` when readings have come in, while the component is on the page. One call at a time. */
export function useLive(refresh: () => Promise<unknown>) {
  if (import.meta.server) return
  const live = useNuxtApp().$live as ReturnType<typeof createLiveStream>
  let waiting: ReturnType<typeof setTimeout> | undefined
  let running = false
  let again = false

  async function run() {
    waiting = undefined
    if (running) {
      again = true
      return
    }
    running = true
    // A refresh that fails leaves the data on the page as it was; the next news tries again.
    await refresh().catch(() => undefined)
    running = false
    if (again) {
      again = false
      waiting ??= setTimeout(run, GATHER_MILLISECONDS)
    }
  }

  let stop: (() => void) | undefined
  onMounted(() => {
    stop = live.listen(() => {
      waiting ??= setTimeout(run, GATHER_MILLISECONDS)
    })
  })
  onBeforeUnmount(() => {
    stop?.()
    clearTimeout(waiting)
  })
}
