import { decodeUtf8, utf8SequenceLength } from './utf8'

export type CsvEncoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252'

/**
 * Windows-1252 where it differs from Latin-1, bytes 0x80 to 0x9F (WHATWG Encoding Standard, index
 * windows-1252). By hand, because the TextDecoder of Node 20 leaves these bytes as control characters.
 */
const WINDOWS_1252 = '\u20AC\u0081\u201A\u0192\u201E\u2026\u2020\u2021\u02C6\u2030\u0160\u2039\u0152\u008D\u017D\u008F\u0090\u2018\u2019\u201C\u201D\u2022\u2013\u2014\u02DC\u2122\u0161\u203A\u0153\u009D\u017E\u0178'

export function decodeWindows1252(bytes: Uint8Array): string {
  let text = ''
  for (const byte of bytes) text += byte >= 0x80 && byte <= 0x9F ? WINDOWS_1252[byte - 0x80]! : String.fromCharCode(byte)
  return text
}

/** UTF-16 by its byte-order mark, or by the NUL that every ASCII character leaves; undefined for anything else. */
export function utf16Of(head: Uint8Array): 'utf-16le' | 'utf-16be' | undefined {
  const [first, second] = head
  if (first === 0xFF && second === 0xFE) return 'utf-16le'
  if (first === 0xFE && second === 0xFF) return 'utf-16be'
  if (second === 0 && first !== 0 && first !== undefined) return 'utf-16le'
  if (first === 0 && second !== 0 && second !== undefined) return 'utf-16be'
  return undefined
}

const lenient = new TextDecoder('utf-8')

/**
 * Decodes lines of a text that is UTF-8 or Windows-1252. Which of them is decided once, by the first
 * character beyond ASCII: well-formed UTF-8 is hardly ever anything else.
 */
export class LineTextDecoder {
  /** undefined: nothing but ASCII so far, which is the same in both. */
  encoding: 'utf-8' | 'windows-1252' | undefined

  constructor(encoding?: 'utf-8') {
    this.encoding = encoding
  }

  /** `fault`: the line is not in the encoding of the lines before it; `text` then holds U+FFFD. */
  decode(bytes: Uint8Array): { text: string, fault: boolean } {
    if (this.encoding === 'windows-1252') return { text: decodeWindows1252(bytes), fault: false }
    const text = decodeUtf8(bytes)
    if (text !== undefined) {
      if (this.encoding === undefined && text.length !== bytes.length) this.encoding = 'utf-8'
      return { text, fault: false }
    }
    if (this.encoding === undefined) {
      const first = bytes.findIndex(byte => byte >= 0x80)
      this.encoding = utf8SequenceLength(bytes, first) > 0 ? 'utf-8' : 'windows-1252'
      return this.decode(bytes)
    }
    return { text: lenient.decode(bytes), fault: true }
  }
}
