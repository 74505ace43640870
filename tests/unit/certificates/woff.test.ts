import { readFile } from 'node:fs/promises'
import { createRequire } from 'node:module'
import { describe, expect, it } from 'vitest'
import { FONT_FILES, loadFonts } from '#server/services/certificates/pdf/fonts'
import { openTypeOfWoff } from '#server/services/certificates/pdf/woff'

/** Checksum of a table: the sum of its 32-bit words (OpenType 1.9, "Calculating checksums"). */
function checksum(bytes: Buffer): number {
  let sum = 0
  for (let at = 0; at < bytes.length; at += 4) sum = (sum + Buffer.concat([bytes.subarray(at, at + 4), Buffer.alloc(4)]).readUInt32BE(0)) >>> 0
  return sum
}

describe('openTypeOfWoff', () => {
  it('gives fonts whose tables are whole, by their own checksums', async () => {
    for (const [name, font] of Object.entries(await loadFonts())) {
      expect(font.readUInt32BE(0), name).toBe(0x00010000)
      const tables = font.readUInt16BE(4)
      expect(tables).toBeGreaterThan(8)
      for (let index = 0; index < tables; index++) {
        const entry = 12 + index * 16
        const tag = font.toString('latin1', entry, entry + 4)
        const bytes = Buffer.from(font.subarray(font.readUInt32BE(entry + 8), font.readUInt32BE(entry + 8) + font.readUInt32BE(entry + 12)))
        // The head table holds an adjustment that its own checksum leaves out.
        if (tag === 'head') bytes.writeUInt32BE(0, 8)
        expect(checksum(bytes), `${name} ${tag}`).toBe(font.readUInt32BE(entry + 4))
      }
    }
  })

  it('refuses what is no WOFF, and what was cut off', async () => {
    const woff = await readFile(createRequire(import.meta.url).resolve(FONT_FILES.mono))
    expect(() => openTypeOfWoff(Buffer.from('wOFF'))).toThrow(RangeError)
    expect(() => openTypeOfWoff(Buffer.alloc(100))).toThrow('no WOFF')
    expect(() => openTypeOfWoff(woff.subarray(0, woff.length / 2))).toThrow()
  })
})
