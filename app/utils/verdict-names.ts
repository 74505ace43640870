import type { VerdictKind } from '#shared/verdict/types'

/** Names of the tags, as the reading's words give them. */
export const VERDICT_NAMES: Record<VerdictKind, string> = {
  'connect': 'Connect',
  'connect-purge-air': 'Connect, purge air',
  'sample-again': 'Sample again',
  'isolate': 'Isolate',
  'isolate-flammable': 'Isolate, flammable',
}
