import { combineSamples } from './repeats'
import { RULE_VERSION } from './rule-version'
import { toMillionth } from './rules/against-limit'
import { judgeAir } from './rules/air'
import { judgeDeclared } from './rules/declared'
import { judgeFlammable } from './rules/flammable'
import { judgeForeign } from './rules/foreign'
import { judgePurity } from './rules/purity'
import { judgeUnknown } from './rules/unknown'
import { judgeValidity } from './rules/validity'
import { judgedSample, meanSample, type JudgedSample } from './sample'
import type { DecisionRule, RefrigerantLimits, RuleResult, Verdict, VerdictInput, VerdictKind } from './types'

/** The rules about what is in the sample, in the order of their weight. */
function judgeContent(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  return [
    judgeFlammable(sample, limits, decision),
    judgeUnknown(sample, limits, decision),
    judgeDeclared(sample),
    judgePurity(sample, limits, decision),
    ...judgeForeign(sample, limits, decision),
    ...judgeAir(sample, limits),
  ]
}

/** With a second sample that agrees, the matter is settled on the mean; doubt about what may burn counts against. */
function settle(results: RuleResult[], sample: JudgedSample, limits: RefrigerantLimits): RuleResult[] {
  if (!results.some(result => result.outcome === 'unclear')) return results
  const plain = judgeContent(sample, limits, { kind: 'simple', guardFactor: 0 })
  return results.map((result, i) => {
    if (result.outcome !== 'unclear') return result
    return { ...result, outcome: result.rule === 'flammable' || result.rule === 'unknown' ? 'fail' : plain[i]!.outcome }
  })
}

const BURNING = new Set<RuleResult['rule']>(['flammable', 'unknown'])
const FOUL = new Set<RuleResult['rule']>(['declared', 'purity', 'foreign'])

/** Flammable before foul, foul before doubt, doubt before air. */
function deciding(results: RuleResult[]): { kind: VerdictKind, by: RuleResult } {
  const failed = (rules: ReadonlySet<RuleResult['rule']>) => results.find(result => result.outcome === 'fail' && rules.has(result.rule))
  const burning = failed(BURNING)
  if (burning) return { kind: 'isolate-flammable', by: burning }
  const foul = failed(FOUL)
  if (foul) return { kind: 'isolate', by: foul }
  const unclear = results.find(result => result.outcome === 'unclear')
  if (unclear) return { kind: 'sample-again', by: unclear }
  const air = results.find(result => result.outcome === 'fail')
  if (air) return { kind: 'connect-purge-air', by: air }
  return { kind: 'connect', by: results.find(result => result.rule === 'purity')! }
}

/**
 * The next step for one reading. Pure: the same input gives the same verdict for ever, under the rule
 * version and the limit set version that it names.
 *
 * Earlier samples of the same visit are combined with this one where they agree (see `combineSamples`);
 * where they don't, the verdict is "sample again" whatever this one shows, and a flammable finding in
 * any of them stands.
 */
export function decideVerdict(input: VerdictInput): Verdict {
  const { declared, limits: set } = input
  const limits = set.limits[declared] ?? set.limits.default
  const own = judgedSample(input.composition, declared, input.uncertainty, input.resolutionPercent)
  const samples = [...input.earlier.map(sample => judgedSample(sample.composition, declared, input.uncertainty, sample.resolutionPercent)), own]
  const combined = samples.length === 1 ? { used: samples, consistent: true, passedOver: 0 } : combineSamples(samples)
  const sample = combined.consistent ? meanSample(combined.used) : own
  let content = judgeContent(sample, limits, set.decision)
  if (combined.consistent && combined.used.length > 1) content = settle(content, sample, limits)
  if (!combined.consistent) content = keepFlammableFinding(content, samples, limits, set.decision)
  const results = [...content, ...judgeValidity(input.validity, input.composition.sum)]
  if (samples.length > 1) {
    results.push({
      rule: 'repeats', outcome: combined.consistent ? (combined.passedOver > 0 ? 'warn' : 'pass') : 'unclear',
      measured: combined.used.length, uncertainty: null, limit: samples.length, probabilityBeyond: null,
    })
  }
  const { kind, by } = deciding(results)
  return {
    kind: kind === 'isolate' && !combined.consistent ? 'sample-again' : kind,
    decidedBy: kind === 'isolate' && !combined.consistent ? 'repeats' : by.rule,
    ...(by.substance && !(kind === 'isolate' && !combined.consistent) ? { decidedBySubstance: by.substance } : {}),
    results,
    limitSetVersion: set.version,
    rule: RULE_VERSION,
    attempt: samples.length,
    purityPercent: toMillionth(sample.purity.percent),
  }
}

function keepFlammableFinding(content: RuleResult[], samples: JudgedSample[], limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  const findings = samples.map(sample => judgeFlammable(sample, limits, decision))
  const worst = findings.find(finding => finding.outcome === 'fail')
  return worst ? content.map(result => (result.rule === 'flammable' ? worst : result)) : content
}
