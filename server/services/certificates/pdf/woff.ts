import { inflateSync } from 'node:zlib'

const WOFF_HEADER = 44
const WOFF_ENTRY = 20
const SFNT_HEADER = 12
const SFNT_ENTRY = 16
const SIGNATURE = 0x774F4646

const aligned = (length: number): number => (length + 3) & ~3

/**
 * The OpenType font inside a WOFF 1.0 file (W3C Recommendation "WOFF File Format 1.0", sections 3 to 5).
 * The PDF library reads WOFF too, but looks past the end of a table where its last glyph is an empty one.
 *
 * @throws RangeError for anything that is not WOFF.
 */
export function openTypeOfWoff(woff: Buffer): Buffer {
  if (woff.length < WOFF_HEADER || woff.readUInt32BE(0) !== SIGNATURE) throw new RangeError('This is no WOFF file.')
  const count = woff.readUInt16BE(12)
  const tables = Array.from({ length: count }, (_, index) => {
    const entry = WOFF_HEADER + index * WOFF_ENTRY
    const offset = woff.readUInt32BE(entry + 4)
    const stored = woff.subarray(offset, offset + woff.readUInt32BE(entry + 8))
    const length = woff.readUInt32BE(entry + 12)
    return { tag: woff.subarray(entry, entry + 4), checksum: woff.readUInt32BE(entry + 16), bytes: stored.length < length ? inflateSync(stored) : stored }
  })
  const directory = SFNT_HEADER + count * SFNT_ENTRY
  const font = Buffer.alloc(directory + tables.reduce((sum, { bytes }) => sum + aligned(bytes.length), 0))
  const power = Math.floor(Math.log2(count))
  font.writeUInt32BE(woff.readUInt32BE(4), 0)
  font.writeUInt16BE(count, 4)
  font.writeUInt16BE(2 ** power * 16, 6)
  font.writeUInt16BE(power, 8)
  font.writeUInt16BE(count * 16 - 2 ** power * 16, 10)
  let at = directory
  for (const [index, { tag, checksum, bytes }] of tables.entries()) {
    const entry = SFNT_HEADER + index * SFNT_ENTRY
    tag.copy(font, entry)
    font.writeUInt32BE(checksum, entry + 4)
    font.writeUInt32BE(at, entry + 8)
    font.writeUInt32BE(bytes.length, entry + 12)
    bytes.copy(font, at)
    at += aligned(bytes.length)
  }
  return font
}
