import type { NormalisedComposition } from '../composition/types'
import type { Designation, Substance } from '../refrigerants/designations'

/** The five next steps. */
export const VERDICTS = ['connect', 'connect-purge-air', 'sample-again', 'isolate', 'isolate-flammable'] as const
export type VerdictKind = (typeof VERDICTS)[number]

/** How well a number is backed; shown beside the source. */
export type SourceMark = 'verified' | 'from memory' | 'common practice, no source'

export interface Limit {
  value: number
  unit: 'percent by mass, air-free' | 'percent by mass of the sample' | 'percent by mole of the sample'
  source: string
  mark: SourceMark
}

export interface RefrigerantLimits {
  purityMinimum: Limit
  /** Each refrigerant other than the declared one. */
  foreignMaximum: Limit
  /** Hydrocarbons and other class 2, 2L or 3 substances that the declared refrigerant does not contain. */
  flammableMaximum: Limit
  unknownMaximum: Limit
  airCaution: Limit
  airAction: Limit
}

/** `guarded`: accept only inside the limit by `guardFactor` times the expanded uncertainty U (JCGM 106:2012, ILAC-G8:09/2019). */
export interface DecisionRule {
  kind: 'simple' | 'guarded'
  /** Width of the guard band as a multiple of U (k = 2); 1 is the ILAC-G8 default, 0.83 that of ISO 14253-1. */
  guardFactor: number
}

/** A versioned, dated table of limits. A verdict names the version that it used; old verdicts keep theirs. */
export interface LimitSet {
  version: number
  name: string
  /** ISO date-time from which it holds. */
  effectiveFrom: string
  note: string
  decision: DecisionRule
  /** `default` serves every declared refrigerant without an entry of its own. */
  limits: { default: RefrigerantLimits } & Partial<Record<Designation, RefrigerantLimits>>
}

/** Standard uncertainties (k = 1) of one instrument for one component, in percent of the sample. */
export interface ComponentUncertainty {
  absolutePercent: number
  /** Share of the value, for example 0.01 for one hundredth of it. */
  relative: number
}

/** From the instrument's certificate. `default` serves components without an entry of their own. */
export type InstrumentUncertainty = { default: ComponentUncertainty, air?: ComponentUncertainty } & Partial<Record<Substance, ComponentUncertainty>>

/** What was known of the instrument and the surroundings when the sample was taken. */
export interface SampleValidity {
  calibrationOverdue: boolean
  filterSpent: boolean
  /** null: not recorded. */
  ambientCelsius: number | null
  ambientMinimumCelsius: number
  ambientMaximumCelsius: number
  /** The quality manager has marked the instrument out of control from a date before this sample. */
  instrumentOutOfControl: boolean
}

export const RULES = ['flammable', 'declared', 'purity', 'foreign', 'unknown', 'air-caution', 'air-action', 'sum', 'calibration', 'filter', 'ambient', 'control', 'repeats'] as const
export type RuleName = (typeof RULES)[number]

/**
 * `pass`: inside the limit, beyond doubt. `unclear`: inside the guard band, too close to call.
 * `fail`: beyond the limit. `warn`: noted, does not decide. `absent`: could not be judged.
 */
export type RuleOutcome = 'pass' | 'unclear' | 'fail' | 'warn' | 'absent'

/** One rule applied to one reading: numbers only. Words are made from it by `explainVerdict`. */
export interface RuleResult {
  rule: RuleName
  /** The contaminant that the rule looked at; absent where it looks at the whole. */
  substance?: Substance
  outcome: RuleOutcome
  /** In the unit of the limit; null where nothing was measured. */
  measured: number | null
  /** Expanded uncertainty U, k = 2, in the same unit; null where none applies. */
  uncertainty: number | null
  limit: number | null
  /** Probability that the true value lies beyond the limit, 0 to 1; null where it can't be stated. */
  probabilityBeyond: number | null
  /** True where the instrument saw nothing: `measured` is then its detection limit. */
  belowDetection?: true
}

export interface Verdict {
  kind: VerdictKind
  /** The rule that decided, with its substance. */
  decidedBy: RuleName
  decidedBySubstance?: Substance
  results: RuleResult[]
  limitSetVersion: number
  /** Version of the rules in code. */
  rule: string
  /** 1 for a first sample of the subject; counts every sample of the same visit, also those that failed. */
  attempt: number
  /** Mass fraction of the declared refrigerant, air-free, in percent, as judged (mean of consistent repeats). */
  purityPercent: number
}

/** An earlier sample of the same subject in the same visit. */
export interface EarlierSample {
  composition: NormalisedComposition
  resolutionPercent: number
}

export interface VerdictInput {
  declared: Designation
  composition: NormalisedComposition
  /** Display step in percent. */
  resolutionPercent: number
  uncertainty: InstrumentUncertainty
  limits: LimitSet
  validity: SampleValidity
  /** Oldest first; empty for a first sample. */
  earlier: EarlierSample[]
}

/** Words for people, made from a verdict's numbers; never stored. */
export interface VerdictWords {
  /** Name of the tag: "Connect", "Connect, purge air", "Sample again", "Isolate", "Isolate, flammable". */
  tag: string
  /** What to do next, for the technician: one short sentence. */
  nextStep: string
  /** Why, for the technician: the rule that decided, with its numbers. */
  reason: string
  /** For the vehicle's owner: plain words, no symbols. */
  plain: string
  /** Cautions that must stand beside the verdict. */
  cautions: string[]
}

export interface RuleWords {
  /** Name of the rule as people read it. */
  title: string
  /** What was found, in a sentence. */
  finding: string
  unit: string
  /** Where the limit comes from. */
  source: string
  mark: SourceMark
}
