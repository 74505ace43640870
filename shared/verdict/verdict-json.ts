import type { RuleResult, Verdict } from './types'

const ordered = ({ belowDetection, limit, measured, outcome, probabilityBeyond, rule, substance, uncertainty }: RuleResult) =>
  ({ belowDetection, limit, measured, outcome, probabilityBeyond, rule, substance, uncertainty })

/**
 * A verdict in canonical JSON (RFC 8785). The members are laid out by hand in the order of their names
 * and written by the engine: every reading is digested and stored through here, and a general
 * canonicaliser took a third of the whole intake.
 */
export function verdictJson({ attempt, decidedBy, decidedBySubstance, kind, limitSetVersion, purityPercent, results, rule }: Verdict): string {
  return JSON.stringify({ attempt, decidedBy, decidedBySubstance, kind, limitSetVersion, purityPercent, results: results.map(ordered), rule })
}
