/** Keys that work without a pointer; the list of the `?` dialog. */
export const KEYS: readonly { keys: readonly string[], does: string }[] = [
  { keys: ['/'], does: 'Search readings' },
  { keys: ['j', '↓'], does: 'Next row of the list' },
  { keys: ['k', '↑'], does: 'Row before' },
  { keys: ['Enter'], does: 'Open the row' },
  { keys: ['Esc'], does: 'Close the pane, leave a field' },
  { keys: ['?'], does: 'This list' },
]

/** True where a key belongs to what is being written, not to the page. */
export function isWriting(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false
  return target.isContentEditable || target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement
    || (target instanceof HTMLInputElement && !['checkbox', 'radio', 'button', 'submit'].includes(target.type))
}
