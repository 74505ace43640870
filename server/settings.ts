import { z } from 'zod'

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
  demoFile: string | null
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
    demoFile: value.COLDSLIP_DEMO_FILE ?? null,
  }
  return read
}
