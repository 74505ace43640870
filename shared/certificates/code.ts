/** Thirty-two signs of five bits each, without those that are taken for one another: no 0 and O, no 1 and I. */
const SIGNS = '23456789ABCDEFGHJKLMNPQRSTUVWXYZ'

/** Bytes of chance in a code: 80 bits, so that one is not found by trying. */
export const CODE_BYTES = 10

/** The code of ten bytes: sixteen signs. @throws RangeError for another number of bytes. */
export function codeOf(bytes: Uint8Array): string {
  if (bytes.length !== CODE_BYTES) throw new RangeError(`A code is made of ${CODE_BYTES} bytes, not ${bytes.length}.`)
  let text = ''
  let held = 0
  let bits = 0
  for (const byte of bytes) {
    held = (held << 8 | byte) & 0xFFFF
    bits += 8
    while (bits >= 5) {
      bits -= 5
      text += SIGNS[held >> bits & 31]
    }
  }
  return text
}

/** A code as somebody typed it, in lower case or with hyphens or spaces, as it is kept; null where it can't be one. */
export function readCode(typed: string): string | null {
  const code = typed.replace(/[\s-]/g, '').toUpperCase()
  return code.length === 16 && [...code].every(sign => SIGNS.includes(sign)) ? code : null
}

/** In groups of four, for reading aloud: `K7QM-2XWA-9PTB-H4RD`. */
export function groupedCode(code: string): string {
  return code.match(/.{1,4}/g)?.join('-') ?? ''
}
