import { isWriting } from '~/utils/keys'

/**
 * j, k and the arrows move between the rows of a list: elements marked `data-row`, which are links and
 * so open with Enter. The arrows work from a row only, because elsewhere they scroll the page.
 */
export function useListKeys(list: Ref<HTMLElement | null>) {
  function onKey(event: KeyboardEvent) {
    if (event.ctrlKey || event.metaKey || event.altKey || isWriting(event.target) || !list.value) return
    const step = { j: 1, k: -1, ArrowDown: 1, ArrowUp: -1 }[event.key]
    if (!step) return
    const rows = [...list.value.querySelectorAll<HTMLElement>('[data-row]')]
    const at = rows.indexOf(document.activeElement as HTMLElement)
    if (event.key.startsWith('Arrow') && at < 0) return
    const current = at < 0 ? rows.findIndex(row => row.getAttribute('aria-current') === 'true') : at
    const next = rows[Math.min(rows.length - 1, Math.max(0, current < 0 ? 0 : current + step))]
    if (!next) return
    event.preventDefault()
    next.focus()
    next.closest('[role="row"]')?.scrollIntoView({ block: 'nearest' })
  }
  onMounted(() => document.addEventListener('keydown', onKey))
  onBeforeUnmount(() => document.removeEventListener('keydown', onKey))
}
