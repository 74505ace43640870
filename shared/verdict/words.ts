import { formatPercent, formatProbability, formatUncertainty } from '../composition/format'
import type { Designation, Substance } from '../refrigerants/designations'
import type { Limit, LimitSet, RefrigerantLimits, RuleName, RuleResult, RuleWords, Verdict, VerdictKind, VerdictWords } from './types'

export interface WordsContext {
  declared: Designation
  limits: LimitSet
  /** Display step of the instrument in percent. */
  resolution: number
}

export const TAGS: Record<VerdictKind, string> = {
  'connect': 'Connect',
  'connect-purge-air': 'Connect, purge air',
  'sample-again': 'Sample again',
  'isolate': 'Isolate',
  'isolate-flammable': 'Isolate, flammable',
}

/** A substance as it stands in a sentence. */
export function nameOf(substance: Substance): string {
  if (substance === 'HC') return 'hydrocarbons'
  return substance === 'OTHER' ? 'an unidentified part' : substance
}

const NEXT_STEPS: Record<VerdictKind, (declared: string) => string> = {
  'connect': declared => `Connect the machine kept for ${declared}.`,
  'connect-purge-air': declared => `Connect the machine kept for ${declared} and let it purge the air.`,
  'sample-again': () => 'Leave the machine off. Clear the hose and take another sample.',
  'isolate': () => 'Keep the ordinary machine off. Recover with equipment meant for contaminated refrigerant, into a cylinder kept for it.',
  'isolate-flammable': () => 'Keep every ordinary machine off and ignition away. Only equipment and people meant for flammable refrigerant go on.',
}

const STANDING_CAUTIONS = [
  'A trained, certified person decides, under the equipment maker\'s instructions, local law and the fire code.',
  'Refrigerant is under pressure and freezes skin and eyes: wear eye protection and gloves.',
  'The reading describes a small sample at one moment. Moisture and oil were not measured.',
]
const FLAMMABLE_CAUTIONS = [
  'Possibly flammable: no sparks, no flames, no smoking; keep the air moving; no ordinary recovery equipment.',
  'Mark the vehicle or cylinder, and follow the local authority and the fire code.',
]
const ISOLATE_CAUTIONS = ['Never vent, never mix: it goes into its own marked cylinder and to a reclaimer or for destruction.']
const MILDLY_FLAMMABLE_DECLARED = 'R-1234yf is mildly flammable (class A2L): use only equipment approved for it.'

const UNFIT: Partial<Record<RuleName, string>> = {
  sum: 'The parts do not add up to 100 within what rounding explains.',
  filter: 'The sample filter had served its time.',
  ambient: 'The air was outside the temperature range of the instrument.',
  control: 'The instrument is out of control since its last good check.',
  repeats: 'The samples of this visit do not agree with one another.',
}

function withUncertainty(result: RuleResult, resolution: number): string {
  if (result.measured === null) return 'not measured'
  if (result.belowDetection) return `below ${formatPercent(result.measured, resolution)} %`
  const value = formatPercent(result.measured, resolution)
  return result.uncertainty === null ? `${value} %` : `${value} ± ${formatUncertainty(result.uncertainty, resolution)} %`
}

function subjectOf(result: RuleResult, declared: Designation): string {
  switch (result.rule) {
    case 'purity': return declared
    case 'flammable': return 'flammable content'
    case 'unknown': return 'unidentified content'
    case 'foreign': return nameOf(result.substance!)
    default: return 'air'
  }
}

/** Why, with the numbers of the rule that decided. */
function reasonOf(verdict: Verdict, { declared, resolution }: WordsContext): string {
  const result = verdict.results.find(item => item.rule === verdict.decidedBy && item.substance === verdict.decidedBySubstance)
    ?? verdict.results.find(item => item.rule === verdict.decidedBy)!
  const unfit = UNFIT[result.rule]
  if (unfit) return unfit
  if (result.rule === 'declared') return `The sample is not ${declared}: it looks like ${nameOf(result.substance ?? 'OTHER')} (${formatPercent(result.measured ?? 0, resolution)} % ${declared}).`
  const settled = verdict.attempt > 1 && verdict.kind !== 'sample-again' ? ` Mean of the samples of this visit (${verdict.attempt} taken).` : ''
  const numbers = `${withUncertainty(result, resolution)} ${subjectOf(result, declared)}, limit ${result.limit} %`
  if (result.outcome === 'unclear') {
    const odds = result.probabilityBeyond === null ? '' : ` (${formatProbability(result.probabilityBeyond)} likely to be beyond it)`
    return `Too close to call: ${numbers}${odds}.`
  }
  const found = numbers.charAt(0).toUpperCase() + numbers.slice(1)
  return verdict.kind === 'connect' ? `No evidence of contamination: ${numbers}.${settled}` : `${found}.${settled}`
}

const PLAIN: Record<VerdictKind, (declared: string) => string> = {
  'connect': declared => `We took a small sample of the refrigerant before starting. It was the kind your vehicle calls for (${declared}), and we found no sign of another gas. Work can go on.`,
  'connect-purge-air': declared => `The refrigerant is the kind your vehicle calls for (${declared}), but air has got in. Our equipment can remove the air. It is worth finding out how it got in.`,
  'sample-again': () => 'The first sample did not give a clear answer, so we take another before going on. Nothing has been connected to your vehicle.',
  'isolate': declared => `Your vehicle should hold ${declared}, but the sample shows something else in it. We must not mix it with clean refrigerant, so it has to be taken out with separate equipment. We cannot tell from the sample who put it in.`,
  'isolate-flammable': () => 'The sample shows gas that can burn, or that could not be identified and may burn. For safety we stopped at once. It needs special equipment to take it out; please do not have the system topped up or opened elsewhere meanwhile.',
}

/** Words for people, made from a verdict's numbers; the same numbers always give the same words. */
export function explainVerdict(verdict: Verdict, context: WordsContext): VerdictWords {
  const { declared } = context
  const cautions = [
    ...(verdict.kind === 'isolate-flammable' ? FLAMMABLE_CAUTIONS : []),
    ...(verdict.kind === 'isolate' || verdict.kind === 'isolate-flammable' ? ISOLATE_CAUTIONS : []),
    ...(declared === 'R-1234yf' ? [MILDLY_FLAMMABLE_DECLARED] : []),
    ...(verdict.results.some(result => result.rule === 'calibration' && result.outcome === 'warn') ? ['The instrument\'s calibration was overdue when the sample was taken.'] : []),
    ...(verdict.results.some(result => result.rule === 'repeats' && result.outcome === 'warn') ? ['An earlier sample of this visit disagreed and was passed over, because three later ones agree. It is kept.'] : []),
    ...STANDING_CAUTIONS,
  ]
  return {
    tag: TAGS[verdict.kind],
    nextStep: NEXT_STEPS[verdict.kind](declared),
    reason: reasonOf(verdict, context),
    plain: PLAIN[verdict.kind](declared),
    cautions,
  }
}

const TITLES: Record<RuleName, string> = {
  'flammable': 'Flammable content',
  'unknown': 'Unidentified content',
  'declared': 'Declared refrigerant',
  'purity': 'Purity',
  'foreign': 'Foreign refrigerant',
  'air-caution': 'Air, caution',
  'air-action': 'Air, action',
  'sum': 'Sum of the parts',
  'calibration': 'Calibration',
  'filter': 'Sample filter',
  'ambient': 'Air temperature',
  'control': 'Instrument in control',
  'repeats': 'Samples of the visit',
}

const LIMIT_OF: Partial<Record<RuleName, keyof RefrigerantLimits>> = {
  'flammable': 'flammableMaximum',
  'unknown': 'unknownMaximum',
  'purity': 'purityMinimum',
  'foreign': 'foreignMaximum',
  'air-caution': 'airCaution',
  'air-action': 'airAction',
}

const NO_LIMIT: Partial<Record<RuleName, Pick<RuleWords, 'unit' | 'source' | 'mark'>>> = {
  sum: { unit: 'percent', source: 'One display step for each listed part and one for what is left out', mark: 'common practice, no source' },
  ambient: { unit: 'degrees Celsius', source: 'SAE J2912: identifiers work from 10 to 49 °C, unless the instrument\'s record says otherwise', mark: 'verified' },
  repeats: { unit: 'samples', source: 'Chi-square test at 99 % (NIST/SEMATECH e-Handbook); a visit is samples within 45 minutes', mark: 'common practice, no source' },
}

function limitOf(rule: RuleName, limits: LimitSet, declared: Designation): Limit | undefined {
  const name = LIMIT_OF[rule]
  return name && (limits.limits[declared] ?? limits.limits.default)[name]
}

function findingOf(result: RuleResult, declared: Designation): string {
  const { rule, outcome, substance } = result
  switch (rule) {
    case 'declared': return outcome === 'fail' ? `Looks like ${nameOf(substance ?? 'OTHER')}, not ${declared}.` : `Is mostly ${declared}.`
    case 'sum': return outcome === 'pass' ? 'The parts add up.' : UNFIT.sum!
    case 'calibration': return outcome === 'pass' ? 'In date.' : 'Overdue when the sample was taken.'
    case 'filter': return outcome === 'pass' ? 'Within its life, as far as recorded.' : UNFIT.filter!
    case 'ambient': return outcome === 'absent' ? 'Not recorded.' : outcome === 'pass' ? 'Inside the instrument\'s range.' : UNFIT.ambient!
    case 'control': return outcome === 'pass' ? 'Nothing known against it.' : UNFIT.control!
    case 'repeats': return outcome === 'unclear' ? UNFIT.repeats! : outcome === 'warn' ? 'The latest samples agree; an earlier one was passed over.' : 'The samples agree; their mean was judged.'
  }
  if (outcome === 'absent') return 'Not reported by the instrument.'
  if (result.belowDetection) return outcome === 'pass' ? 'Below detection.' : 'Below detection, but the detection limit is too coarse for this limit.'
  if (outcome === 'pass') return 'Inside the limit, beyond doubt.'
  if (outcome === 'unclear') return 'Inside the guard band: too close to call.'
  if (outcome === 'warn') return 'At or above the caution level.'
  return rule === 'purity' ? 'Below the limit.' : 'Beyond the limit.'
}

/** One rule as people read it: its name, what was found, the unit, and where its limit comes from. */
export function explainRule(result: RuleResult, limits: LimitSet, declared: Designation): RuleWords {
  const limit = limitOf(result.rule, limits, declared)
  const rest = limit
    ? { unit: limit.unit, source: limit.source, mark: limit.mark }
    : NO_LIMIT[result.rule] ?? { unit: 'percent by mass, air-free', source: 'The instrument\'s record', mark: 'common practice, no source' as const }
  const title = result.rule === 'foreign' ? `${TITLES.foreign}: ${nameOf(result.substance!)}` : TITLES[result.rule]
  return { title, finding: findingOf(result, declared), ...rest }
}
