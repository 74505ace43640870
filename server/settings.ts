import { createPrivateKey, createPublicKey, type KeyObject } from 'node:crypto'
import { z } from 'zod'

function readPrivateKey(text: string, context: z.core.$RefinementCtx): KeyObject | undefined {
  if (text === '') return undefined
  try {
    const key = text.includes('-----BEGIN') ? createPrivateKey(text.replaceAll('\\n', '\n')) : createPrivateKey({ key: Buffer.from(text, 'base64'), format: 'der', type: 'pkcs8' })
    if (key.asymmetricKeyType === 'ed25519') return key
  } catch {
    // Said below, for what is no key and what is another kind of key alike.
  }
  context.addIssue({ code: 'custom', message: 'must be an Ed25519 private key, PKCS #8 as PEM or base64' })
  return z.NEVER
}

function readPublicKeys(text: string, context: z.core.$RefinementCtx): KeyObject[] {
  try {
    return text.split(',').map(x => x.trim()).filter(Boolean).map(x => createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x }, format: 'jwk' }))
  } catch {
    context.addIssue({ code: 'custom', message: 'must be Ed25519 public keys, 32 bytes as base64url each, with commas between' })
    return z.NEVER
  }
}

/**
 * Everything that an installation may set, read once from the environment. A wrong value stops the
 * start with one clear sentence: a server that half works is worse than one that refuses.
 */
const environment = z.object({
  DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/, error: 'DATABASE_URL must be a postgres:// address' }),
  /** Seals the session cookie; a process that serves pages won't start without. */
  NUXT_SESSION_PASSWORD: z.string().min(32, 'must have at least 32 characters').optional(),
  /** What this process does: serve pages and intake, work the queue, or both. */
  COLDSLIP_ROLE: z.enum(['all', 'web', 'worker']).default('all'),
  HOST: z.string().default('127.0.0.1'),
  /** Proxies in front whose X-Forwarded-For entries are believed, counted from the right. */
  COLDSLIP_TRUSTED_PROXIES: z.coerce.number().int().min(0).max(10).default(0),
  COLDSLIP_POOL_SIZE: z.coerce.number().int().min(1).max(100).default(10),
  COLDSLIP_WORKERS: z.coerce.number().int().min(1).max(16).default(2),
  /** Where others reach this server, for what is printed; unset, certificates bear the address of the request that asked for them. */
  COLDSLIP_PUBLIC_URL: z.url({ protocol: /^https?$/, error: 'must be an http:// or https:// address' }).optional(),
  /** Signs certificates: an Ed25519 private key, PKCS #8 as PEM or base64. Without it none are issued. */
  COLDSLIP_SIGNING_KEY: z.string().transform(readPrivateKey).optional(),
  /** Public keys of former signing keys, as their `x` stands in the published list, with commas between. */
  COLDSLIP_SIGNING_OLD_PUBLIC_KEYS: z.string().transform(readPublicKeys).optional(),
  /** Requests a minute that one device token may send on the whole; a third of it may come at once. */
  COLDSLIP_INTAKE_PER_MINUTE: z.coerce.number().int().min(1).max(10_000_000).default(6000),
  /** Where .data/demo.json is, written when the demo scenario was loaded. */
  COLDSLIP_DEMO_FILE: z.string().optional(),
})

export interface Settings {
  databaseUrl: string
  sessionPassword: string | null
  servesWeb: boolean
  runsWorker: boolean
  /** True where only this machine can reach the server; demo accounts work nowhere else. */
  loopbackOnly: boolean
  trustedProxies: number
  poolSize: number
  workers: number
  intakePerMinute: number
  demoFile: string | null
  publicUrl: string | null
  signingKey: KeyObject | null
  oldPublicKeys: KeyObject[]
}

let read: Settings | null = null

/** @throws Error with one sentence per wrong setting. */
export function settings(): Settings {
  if (read) return read
  const parsed = environment.safeParse(process.env)
  if (!parsed.success) {
    throw new Error(`Settings: ${parsed.error.issues.map(issue => `${issue.path.join('.')}: ${issue.message}`).join('; ')}`)
  }
  const value = parsed.data
  const host = value.HOST.replace(/^\[|\]$/g, '')
  read = {
    databaseUrl: value.DATABASE_URL,
    sessionPassword: value.NUXT_SESSION_PASSWORD ?? null,
    servesWeb: value.COLDSLIP_ROLE !== 'worker',
    runsWorker: value.COLDSLIP_ROLE !== 'web',
    loopbackOnly: host === 'localhost' || host === '::1' || /^127\./.test(host),
    trustedProxies: value.COLDSLIP_TRUSTED_PROXIES,
    poolSize: value.COLDSLIP_POOL_SIZE,
    workers: value.COLDSLIP_WORKERS,
    intakePerMinute: value.COLDSLIP_INTAKE_PER_MINUTE,
    demoFile: value.COLDSLIP_DEMO_FILE ?? null,
    publicUrl: value.COLDSLIP_PUBLIC_URL?.replace(/\/+$/, '') ?? null,
    signingKey: value.COLDSLIP_SIGNING_KEY ?? null,
    oldPublicKeys: value.COLDSLIP_SIGNING_OLD_PUBLIC_KEYS ?? [],
  }
  return read
}
