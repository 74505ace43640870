import { randomBytes, scrypt, timingSafeEqual, type ScryptOptions } from 'node:crypto'

/** N = 2^15, r = 8, p = 3: a setting of ASVS 5.0 Appendix C; about a third of a second on a plain core. */
const COST: ScryptOptions = { N: 2 ** 15, r: 8, p: 3, maxmem: 96 * 1024 * 1024 }
const KEY_LENGTH = 32

/** Hashing runs on threads that also serve files and names: a flood of sign-ins must not take them all. */
const AT_ONCE = 2
const MOST_WAITING = 40
let running = 0
const waiting: (() => void)[] = []

/** More sign-ins are waiting than can be worked off soon. */
export class TooManySignIns extends Error {}

async function slot<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) {
    if (waiting.length >= MOST_WAITING) throw new TooManySignIns('too many sign-ins at once')
    await new Promise<void>(resolve => waiting.push(resolve))
  }
  running++
  try {
    return await work()
  } finally {
    running--
    waiting.shift()?.()
  }
}

function derive(password: string, salt: Buffer): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    // The same letters typed on another system may come as other code points; NFC makes them one.
    scrypt(password.normalize('NFC'), salt, KEY_LENGTH, COST, (error, key) => (error ? reject(error) : resolve(key)))
  })
}

/** A salted scrypt hash with its parameters: `scrypt$15$8$3$salt$key`. */
export async function hashPassword(password: string): Promise<string> {
  const salt = randomBytes(16)
  const key = await slot(() => derive(password, salt))
  return `scrypt$15$8$3$${salt.toString('base64url')}$${key.toString('base64url')}`
}

/** Takes as long for an unknown account (`hash` null) as for a wrong password, so that addresses can't be found out. */
export async function verifyPassword(password: string, hash: string | null): Promise<boolean> {
  const [, , , , salt, key] = (hash ?? `scrypt$15$8$3$${'A'.repeat(22)}$${'A'.repeat(43)}`).split('$')
  const derived = await slot(() => derive(password, Buffer.from(salt!, 'base64url')))
  return timingSafeEqual(derived, Buffer.from(key!, 'base64url')) && hash !== null
}
