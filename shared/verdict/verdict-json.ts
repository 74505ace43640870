import type { RuleResult, Verdict } from './types'

function resultJson(result: RuleResult): string {
  const { belowDetection, limit, measured, outcome, probabilityBeyond, rule, substance, uncertainty } = result
  return `{${belowDetection ? '"belowDetection":true,' : ''}"limit":${limit},"measured":${measured},"outcome":"${outcome}","probabilityBeyond":${probabilityBeyond},"rule":"${rule}"${substance === undefined ? '' : `,"substance":"${substance}"`},"uncertainty":${uncertainty}}`
}

/** A verdict in canonical JSON (RFC 8785), written out member by member like the compositions. */
export function verdictJson(verdict: Verdict): string {
  let text = `{"attempt":${verdict.attempt},"decidedBy":"${verdict.decidedBy}"`
  if (verdict.decidedBySubstance !== undefined) text += `,"decidedBySubstance":"${verdict.decidedBySubstance}"`
  text += `,"kind":"${verdict.kind}","limitSetVersion":${verdict.limitSetVersion},"purityPercent":${verdict.purityPercent},"results":[`
  for (let i = 0; i < verdict.results.length; i++) text += (i > 0 ? ',' : '') + resultJson(verdict.results[i]!)
  return `${text}],"rule":"${verdict.rule}"}`
}
