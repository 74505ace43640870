import type { Right } from '#shared/access/roles'

export interface Screen {
  to: string
  name: string
  /** Shown only to those with this right. */
  right?: Right
  /** Stands in the phone's bar; the others are under More. */
  onPhone?: boolean
  glyph: 'bench' | 'readings' | 'intake' | 'page'
}

/** The screens of the rail, in order. Only screens that exist stand here; a new screen adds its line. */
export const SCREENS: readonly Screen[] = [
  { to: '/bench', name: 'Bench', right: 'readings.see', onPhone: true, glyph: 'bench' },
  { to: '/readings', name: 'Readings', right: 'readings.see', onPhone: true, glyph: 'readings' },
  { to: '/intake', name: 'Intake', right: 'intake.see', onPhone: true, glyph: 'intake' },
  { to: '/settings', name: 'Settings', glyph: 'page' },
]

/** Pages that need no account. */
export const PUBLIC_SCREENS: readonly Screen[] = [
  { to: '/docs/intake', name: 'Sending readings in', glyph: 'page' },
]
