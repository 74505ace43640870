/** JSON Pointer (RFC 6901) to a place within a record; '' is the record itself. */
export function pointerTo(path: readonly PropertyKey[]): string {
  let pointer = ''
  for (const step of path) pointer += `/${escapePointerStep(String(step))}`
  return pointer
}

export function escapePointerStep(step: string): string {
  return step.includes('~') || step.includes('/') ? step.replaceAll('~', '~0').replaceAll('/', '~1') : step
}

/** What stands at a path; undefined where the path leads nowhere. Only own members are followed. */
export function valueAt(root: unknown, path: readonly PropertyKey[]): unknown {
  let value = root
  for (const step of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return undefined
    value = (value as Record<PropertyKey, unknown>)[step]
  }
  return value
}
