import { z } from 'zod'
import type { Role } from '../access/roles'

export const signInBody = z.object({
  email: z.string().trim().min(3).max(254),
  password: z.string().min(1).max(256),
})

/** Who is signed in; what the browser knows of it. */
export interface SessionView {
  person: { id: string, name: string, email: string }
  organisation: { id: string, name: string, demo: boolean }
  roles: Role[]
  shops: { id: string, name: string, timeZone: string }[]
}

export interface SessionRow {
  id: string
  createdAt: string
  lastSeenAt: string
  userAgent: string
  current: boolean
}

export interface DeviceTokenRow {
  id: string
  name: string
  /** Recognisable start of the token. */
  prefix: string
  instrument: { id: string, serial: string } | null
  shop: { id: string, name: string }
  createdAt: string
  lastUsedAt: string | null
  revokedAt: string | null
}

/** What a device token may do: hand readings in, read them back. */
export const TOKEN_SCOPES = ['intake', 'read'] as const

export const createTokenBody = z.object({
  name: z.string().trim().min(1).max(100),
  instrumentId: z.uuid(),
  scopes: z.array(z.enum(TOKEN_SCOPES)).min(1).default(['intake']),
})
