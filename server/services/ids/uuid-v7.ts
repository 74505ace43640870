import { randomFillSync } from 'node:crypto'

const pool = Buffer.alloc(16 * 1024)
let at = pool.length

/** Random bytes are drawn in blocks: one system call for each id would cost more than the id. */
function random10(): Buffer {
  if (at + 10 > pool.length) {
    randomFillSync(pool)
    at = 0
  }
  at += 10
  return pool.subarray(at - 10, at)
}

const hex = Array.from({ length: 256 }, (_, i) => i.toString(16).padStart(2, '0'))

/** A UUID of version 7 (RFC 9562 section 5.7) for the given instant in milliseconds since 1970. */
export function uuidV7(milliseconds: number): string {
  const r = random10()
  const high = Math.floor(milliseconds / 2 ** 16)
  const low = milliseconds % 2 ** 16
  const time = high.toString(16).padStart(8, '0')
  return `${time}-${low.toString(16).padStart(4, '0')}-7${hex[r[0]!]![1]}${hex[r[1]!]}-${hex[(r[2]! & 0x3F) | 0x80]}${hex[r[3]!]}-${hex[r[4]!]}${hex[r[5]!]}${hex[r[6]!]}${hex[r[7]!]}${hex[r[8]!]}${hex[r[9]!]}`
}

/** The instant that a version 7 UUID was made for; null for any other text. */
export function instantOfUuidV7(id: string): Date | null {
  if (!/^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/i.test(id)) return null
  return new Date(Number.parseInt(id.slice(0, 8) + id.slice(9, 13), 16))
}
