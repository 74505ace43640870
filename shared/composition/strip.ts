import type { ReadingDetail, ReadingRow } from '../api/readings'
import type { Designation, Substance } from '../refrigerants/designations'
import { belongsTo, showsBlend } from '../verdict/declared-content'
import { isFlammable } from '../verdict/flammable-substances'
import type { RuleName, RuleOutcome, RuleResult } from '../verdict/types'
import { figure } from './figures'
import { substanceName } from './substance-look'

/** A limit as the lens draws it, on the axis of its lane, in percent. */
export interface LaneLimit {
  at: number
  words: string
  /** The guard band, in which the matter is too close to call; null where the rule has none. */
  guard: { from: number, to: number } | null
}

/** One contaminant in the lens. Numbers in percent. */
export interface Lane {
  substance: Substance | 'air'
  percent: number
  /** Expanded uncertainty (k = 2); null where it is not known. */
  uncertainty: number | null
  belowDetection: boolean
  /** What the percentage is a share of, in words. */
  basis: string
  limits: LaneLimit[]
  outcome: RuleOutcome | null
}

/** Everything that the strip and the lens draw. Numbers in percent by mass. */
export interface Strip {
  declared: Designation
  purityPercent: number
  purityUncertainty: number | null
  purityMinimum: number | null
  resolution: number
  /** Largest first; air last. */
  lanes: Lane[]
}

const OUTCOME_ORDER: readonly RuleOutcome[] = ['fail', 'unclear', 'absent', 'warn', 'pass']

/** From a row of the results browser: no limits, no uncertainties of the parts. */
export function stripFromRow(row: Pick<ReadingRow, 'declared' | 'purityPercent' | 'purityUncertainty' | 'resolution' | 'contaminants' | 'airPercent'>): Strip {
  const lanes: Lane[] = row.contaminants.map(part => ({
    substance: part.substance, percent: part.percent, uncertainty: null, belowDetection: false, basis: 'percent by mass, air-free', limits: [], outcome: null,
  }))
  if (row.airPercent !== null) {
    lanes.push({ substance: 'air', percent: row.airPercent, uncertainty: null, belowDetection: false, basis: 'percent by mass of the sample', limits: [], outcome: null })
  }
  return {
    declared: row.declared, purityPercent: row.purityPercent, purityUncertainty: row.purityUncertainty, purityMinimum: null, resolution: row.resolution, lanes,
  }
}

type Judged = Pick<ReadingDetail, 'declared' | 'purityPercent' | 'purityUncertainty' | 'resolution' | 'composition' | 'rules' | 'marks' | 'limitSet'>

/** From a whole reading: each lane with the limits, guard bands and uncertainties of the rules that looked at it. */
export function stripFromDetail(reading: Judged): Strip {
  const { guardFactor } = reading.limitSet
  const lane = (substance: Substance | 'air', percent: number, belowDetection: boolean, highest: number): Lane => {
    const rules = reading.rules.filter(rule => looksAt(rule, substance))
    // Only air is judged on another basis than the composition holds; the lane follows the limit's.
    const judged = substance === 'air' ? rules.find(rule => rule.measured !== null)?.measured : undefined
    const limits = rules.filter(rule => rule.limit !== null).map((rule): LaneLimit => ({
      at: rule.limit!,
      words: LIMIT_WORDS[rule.rule] ?? rule.rule,
      guard: guardBand(rule, guardFactor),
    }))
    return {
      substance,
      percent: belowDetection ? highest : judged ?? percent,
      uncertainty: belowDetection ? null : rules.find(rule => rule.uncertainty !== null)?.uncertainty ?? null,
      belowDetection,
      basis: substance === 'air' ? rules[0]?.words.unit ?? 'percent by mass of the sample' : 'percent by mass, air-free',
      limits: limits.length > 0 ? distinct(limits) : standingLimits(substance, reading.marks),
      outcome: rules.map(rule => rule.outcome).sort((a, b) => OUTCOME_ORDER.indexOf(a) - OUTCOME_ORDER.indexOf(b))[0] ?? null,
    }
  }
  const blendShown = showsBlend(reading.declared, reading.composition.parts)
  const lanes = reading.composition.parts
    .filter(part => !belongsTo(reading.declared, part.substance, blendShown) && (part.massFraction > 0 || part.belowDetection))
    .map(part => lane(part.substance, part.massFraction * 100, part.belowDetection, part.massFractionHigh * 100))
    .sort((a, b) => Number(a.belowDetection) - Number(b.belowDetection) || b.percent - a.percent)
  const air = reading.composition.air
  if (air) lanes.push(lane('air', air.massFraction * 100, air.belowDetection, air.massFractionHigh * 100))
  return {
    declared: reading.declared,
    purityPercent: reading.purityPercent,
    purityUncertainty: reading.purityUncertainty,
    purityMinimum: reading.marks.purityMinimum,
    resolution: reading.resolution,
    lanes,
  }
}

/** Rules on a whole group name no substance; their limit stands on the lane of each member, which alone may not pass it either. */
function looksAt({ rule, substance }: RuleResult, lane: Substance | 'air'): boolean {
  if (lane === 'air') return rule === 'air-caution' || rule === 'air-action'
  if (rule === 'flammable') return substance ? substance === lane : isFlammable(lane)
  if (rule === 'unknown') return substance ? substance === lane : lane === 'OTHER'
  return rule === 'foreign' && substance === lane
}

const LIMIT_WORDS: Partial<Record<RuleName, string>> = { 'foreign': 'foreign', 'flammable': 'flammable', 'unknown': 'unknown', 'air-caution': 'caution', 'air-action': 'action' }

/** As the rules hold it: on both sides of a limit of foreign refrigerant, below the levels that call for action; air has none. */
function guardBand({ rule, limit, uncertainty }: RuleResult, guardFactor: number): LaneLimit['guard'] {
  if (limit === null || uncertainty === null || guardFactor === 0 || rule === 'air-caution' || rule === 'air-action') return null
  const width = guardFactor * uncertainty
  return { from: Math.max(0, limit - width), to: rule === 'foreign' ? limit + width : limit }
}

function standingLimits(substance: Substance | 'air', marks: ReadingDetail['marks']): LaneLimit[] {
  const at = (value: number, words: string): LaneLimit => ({ at: value, words, guard: null })
  if (substance === 'air') return [at(marks.airCaution, 'caution'), at(marks.airAction, 'action')]
  if (substance === 'OTHER') return [at(marks.unknownMaximum, 'unknown')]
  if (substance === 'HC') return [at(marks.flammableMaximum, 'flammable')]
  return [at(marks.foreignMaximum, 'foreign')]
}

/** Two rules with the same limit make one tick; the wider guard band is drawn. */
function distinct(limits: LaneLimit[]): LaneLimit[] {
  const byPlace = new Map<number, LaneLimit>()
  for (const limit of limits) {
    const known = byPlace.get(limit.at)
    byPlace.set(limit.at, known ? { at: limit.at, words: `${known.words}, ${limit.words}`, guard: union(known.guard, limit.guard) } : limit)
  }
  return [...byPlace.values()].sort((a, b) => a.at - b.at)
}

function union(one: LaneLimit['guard'], other: LaneLimit['guard']): LaneLimit['guard'] {
  if (!one || !other) return one ?? other
  return { from: Math.min(one.from, other.from), to: Math.max(one.to, other.to) }
}

const SCALES = [5, 10, 20, 50, 100] as const

/** Right end of the lens in percent: 5 where everything that it must show fits, wider when needed. */
export function lensEnd(lanes: readonly Lane[]): number {
  const furthest = Math.max(0, ...lanes.flatMap(lane => [lane.percent + (lane.uncertainty ?? 0), ...lane.limits.map(limit => limit.at)]))
  return SCALES.find(end => furthest <= end) ?? 100
}

/** Five or six round ticks from 0 to the end of the lens. */
export function lensTicks(end: number): number[] {
  const step = end / 5
  return Array.from({ length: 6 }, (_, index) => index * step)
}

/** The strip in one sentence, for those who do not see it. */
export function stripSentence(strip: Strip): string {
  const share = (lane: Lane) => `${substanceName(lane.substance)} ${lane.belowDetection ? 'below ' : ''}${figure(lane.percent, strip.resolution)} %`
  const spread = strip.purityUncertainty === null ? '' : ` plus or minus ${figure(strip.purityUncertainty, strip.resolution)}`
  const rest = strip.lanes.length > 0 ? strip.lanes.map(share).join(', ') : 'nothing else found'
  return `${strip.declared} ${figure(strip.purityPercent, strip.resolution)}${spread} % by mass, air-free; ${rest}.`
}
