const strict = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true })

/** Strict UTF-8; undefined where the bytes are no UTF-8. A byte-order mark stays in the text. */
export function decodeUtf8(bytes: Uint8Array): string | undefined {
  try {
    return strict.decode(bytes)
  } catch {
    return undefined
  }
}

/** The beginning of a text without its byte-order mark. */
export function withoutUtf8Mark(bytes: Uint8Array): Uint8Array {
  return bytes[0] === 0xEF && bytes[1] === 0xBB && bytes[2] === 0xBF ? bytes.subarray(3) : bytes
}

/** Offset of the first byte that is not part of well-formed UTF-8 (Unicode 15, table 3-7); −1 where all are. */
export function offsetOfUtf8Fault(bytes: Uint8Array): number {
  let at = 0
  while (at < bytes.length) {
    const length = utf8SequenceLength(bytes, at)
    if (length === 0) return at
    at += length
  }
  return -1
}

/** Length of the well-formed sequence at `at`, 1 to 4; 0 where there is none. */
export function utf8SequenceLength(bytes: Uint8Array, at: number): number {
  const lead = bytes[at]!
  if (lead < 0x80) return 1
  const second = bytes[at + 1] ?? 0
  if (lead >= 0xC2 && lead <= 0xDF) return isContinuation(second) ? 2 : 0
  const third = bytes[at + 2] ?? 0
  if (lead >= 0xE0 && lead <= 0xEF) {
    const lowest = lead === 0xE0 ? 0xA0 : 0x80
    const highest = lead === 0xED ? 0x9F : 0xBF
    return second >= lowest && second <= highest && isContinuation(third) ? 3 : 0
  }
  if (lead >= 0xF0 && lead <= 0xF4) {
    const lowest = lead === 0xF0 ? 0x90 : 0x80
    const highest = lead === 0xF4 ? 0x8F : 0xBF
    return second >= lowest && second <= highest && isContinuation(third) && isContinuation(bytes[at + 3] ?? 0) ? 4 : 0
  }
  return 0
}

function isContinuation(byte: number): boolean {
  return byte >= 0x80 && byte <= 0xBF
}
