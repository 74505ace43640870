import { createHash, randomBytes, timingSafeEqual } from 'node:crypto'
import { crc32 } from 'node:zlib'

const ALPHABET = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz'
const PREFIX = 'coldslip_device_'
const LOOKUP_LENGTH = 10
/** 32 characters of base 62 are 190 bits. */
const SECRET_LENGTH = 32
const CHECK_LENGTH = 6
const SHAPE = new RegExp(`^${PREFIX}[0-9A-Za-z]{${LOOKUP_LENGTH + SECRET_LENGTH + CHECK_LENGTH}}$`)

function randomText(length: number): string {
  let text = ''
  while (text.length < length) {
    // 248 = 4 × 62: a byte above would favour the first letters.
    for (const byte of randomBytes(length * 2)) if (byte < 248 && text.length < length) text += ALPHABET[byte % 62]
  }
  return text
}

function checkText(body: string): string {
  let value = crc32(body)
  let text = ''
  for (let i = 0; i < CHECK_LENGTH; i++) {
    text = ALPHABET[value % 62] + text
    value = Math.floor(value / 62)
  }
  return text
}

export interface IssuedToken {
  /** Shown once, never stored. */
  token: string
  lookup: string
  digest: Buffer
}

const digestOf = (token: string): Buffer => createHash('sha256').update(token).digest()

/** A new device token: a prefix that names issuer and kind, a part that finds its row, a secret, and a check sum that tells a typing slip without asking the database. */
export function issueToken(): IssuedToken {
  const lookup = randomText(LOOKUP_LENGTH)
  const body = PREFIX + lookup + randomText(SECRET_LENGTH)
  const token = body + checkText(body)
  return { token, lookup, digest: digestOf(token) }
}

/** The look-up part of a well-formed token; null where shape or check sum are wrong. */
export function lookupOf(token: string): string | null {
  if (!SHAPE.test(token)) return null
  const body = token.slice(0, -CHECK_LENGTH)
  if (checkText(body) !== token.slice(-CHECK_LENGTH)) return null
  return token.slice(PREFIX.length, PREFIX.length + LOOKUP_LENGTH)
}

/** A fast hash is right for a secret of this length; the comparison takes the same time wherever it differs. */
export function matches(token: string, digest: Uint8Array): boolean {
  return timingSafeEqual(digestOf(token), digest)
}

/** Recognisable start of a token, for lists. */
export const shownPrefix = (lookup: string): string => `${PREFIX}${lookup}…`
