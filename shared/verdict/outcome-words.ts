import type { RuleOutcome, SourceMark } from './types'

/** Outcome of a rule in words, with a drawing of its own (RuleOutcomeMark.vue). */
export const OUTCOME_WORDS: Record<RuleOutcome, string> = {
  pass: 'Inside',
  unclear: 'Too close to call',
  fail: 'Beyond',
  warn: 'Noted',
  absent: 'Not judged',
}

/** What stands beside a source that is not verified. */
export const MARK_WORDS: Record<SourceMark, string | null> = {
  'verified': null,
  'from memory': 'from memory, not checked against the text',
  'common practice, no source': 'common practice, no source',
}
