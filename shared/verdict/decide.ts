import { combineSamples, type CombinedSamples } from './repeats'
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
import type { DecisionRule, RefrigerantLimits, RuleName, RuleResult, Verdict, VerdictInput, VerdictKind } from './types'

/** The rules about what is in the sample, in the order of their weight. */
function judgeContent(sample: JudgedSample, limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  return [
    ...judgeFlammable(sample, limits, decision),
    judgeUnknown(sample, limits, decision),
    judgeDeclared(sample),
    judgePurity(sample, limits, decision),
    ...judgeForeign(sample, limits, decision),
    ...judgeAir(sample, limits),
  ]
}

/** Rules whose failure means that the content may burn. */
const mayBurn = (rule: RuleName): boolean => rule === 'flammable' || rule === 'unknown'
/** Rules whose failure means that the charge is not what was declared. */
const isFoul = (rule: RuleName): boolean => rule === 'declared' || rule === 'purity' || rule === 'foreign'

/**
 * With a second sample that agrees, what was too close to call is settled on the mean; doubt about what
 * may burn counts against. A detection limit that is too coarse for a limit stays so however often it is tried.
 */
function settle(results: RuleResult[], sample: JudgedSample, limits: RefrigerantLimits): RuleResult[] {
  if (!results.some(({ outcome }) => outcome === 'unclear')) return results
  const plain = judgeContent(sample, limits, { kind: 'simple', guardFactor: 0 })
  return results.map((result, i) => {
    if (result.outcome !== 'unclear' || result.belowDetection) return result
    return { ...result, outcome: mayBurn(result.rule) ? 'fail' : plain[i]!.outcome }
  })
}

/** Where the samples disagree, a finding of flammable content in any of them stands. */
function keepFlammableFinding(content: RuleResult[], samples: JudgedSample[], limits: RefrigerantLimits, decision: DecisionRule): RuleResult[] {
  for (const sample of samples) {
    const finding = [...judgeFlammable(sample, limits, decision), judgeUnknown(sample, limits, decision)].find(({ outcome }) => outcome === 'fail')
    if (finding) return [finding, ...content.filter(({ rule, substance }) => rule !== finding.rule || substance !== finding.substance)]
  }
  return content
}

function repeatsResult({ used, consistent, passedOver }: CombinedSamples, taken: number): RuleResult {
  const outcome = !consistent ? 'unclear' : passedOver > 0 ? 'warn' : 'pass'
  return { rule: 'repeats', outcome, measured: used.length, uncertainty: null, limit: taken, probabilityBeyond: null }
}

/** Flammable before foul, foul before doubt, doubt before air. Samples that disagree leave nothing but danger beyond doubt. */
function deciding(results: RuleResult[], consistent: boolean): { kind: VerdictKind, by: RuleResult } {
  let foul: RuleResult | undefined
  let unclear: RuleResult | undefined
  let air: RuleResult | undefined
  let purity: RuleResult | undefined
  for (const result of results) {
    const { rule, outcome } = result
    if (rule === 'purity') purity = result
    if (outcome === 'unclear') unclear ??= result
    if (outcome !== 'fail') continue
    if (mayBurn(rule)) return { kind: 'isolate-flammable', by: result }
    if (isFoul(rule)) foul ??= result
    else air ??= result
  }
  if (!consistent) return { kind: 'sample-again', by: results.at(-1)! }
  if (foul) return { kind: 'isolate', by: foul }
  if (unclear) return { kind: 'sample-again', by: unclear }
  if (air) return { kind: 'connect-purge-air', by: air }
  return { kind: 'connect', by: purity! }
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
  const { declared, limits: set, uncertainty, earlier } = input
  const limits = set.limits[declared] ?? set.limits.default
  let sample = judgedSample(input.composition, declared, uncertainty, input.resolutionPercent)
  let content: RuleResult[]
  let repeats: RuleResult | undefined
  if (earlier.length === 0) content = judgeContent(sample, limits, set.decision)
  else {
    const samples = [...earlier.map(({ composition, resolutionPercent }) => judgedSample(composition, declared, uncertainty, resolutionPercent)), sample]
    const combined = combineSamples(samples)
    if (combined.consistent) sample = meanSample(combined.used)
    content = judgeContent(sample, limits, set.decision)
    content = combined.consistent ? settle(content, sample, limits) : keepFlammableFinding(content, samples, limits, set.decision)
    repeats = repeatsResult(combined, samples.length)
  }
  const results = [...content, ...judgeValidity(input.validity, input.composition.sum)]
  if (repeats) results.push(repeats)
  const { kind, by } = deciding(results, repeats?.outcome !== 'unclear')
  const verdict: Verdict = {
    kind,
    decidedBy: by.rule,
    results,
    limitSetVersion: set.version,
    rule: RULE_VERSION,
    attempt: earlier.length + 1,
    purityPercent: toMillionth(sample.purity.percent),
  }
  if (by.substance) verdict.decidedBySubstance = by.substance
  return verdict
}
