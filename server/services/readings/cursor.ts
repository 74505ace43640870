import { createHash } from 'node:crypto'

export interface Cursor { sampledAt: Date, id: string }

/** A cursor belongs to the filters it was made with; with others it would skip readings in silence. */
function mark(filters: object): string {
  const entries = Object.entries(filters).filter(([, value]) => value !== undefined).sort(([a], [b]) => (a < b ? -1 : 1))
  return createHash('sha256').update(JSON.stringify(entries)).digest('base64url').slice(0, 8)
}

export function writeCursor(cursor: Cursor, filters: object): string {
  return `${mark(filters)}.${cursor.sampledAt.getTime().toString(36)}.${cursor.id}`
}

/** @returns null where the text is no cursor of these filters. */
export function readCursor(text: string, filters: object): Cursor | null {
  const [made, time, id] = text.split('.')
  if (made !== mark(filters) || !time || !/^[0-9a-z]{1,10}$/.test(time) || !id || !/^[0-9a-f-]{36}$/.test(id)) return null
  const sampledAt = new Date(Number.parseInt(time, 36))
  return Number.isNaN(sampledAt.getTime()) ? null : { sampledAt, id }
}
