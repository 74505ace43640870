import type { Substance } from '../refrigerants/designations'

/** What a percentage is a share of: mass, or amount of substance (volume of an ideal gas is mole). */
export type Basis = 'mass' | 'mole'

/** `apart`: the parts sum to 100 without air. `within`: they sum to 100 together with air. */
export type AirCounting = 'apart' | 'within'

/** `<`: below detection; the number beside it is then the detection limit. */
export type Qualifier = '<'

declare const massBrand: unique symbol
declare const moleBrand: unique symbol
/** A share by mass, 0 to 1. */
export type MassFraction = number & { readonly [massBrand]: true }
/** A share by amount of substance, 0 to 1. */
export type MoleFraction = number & { readonly [moleBrand]: true }

export interface ReportedPart {
  substance: Substance
  /** 0 to 100, on the basis of the composition. */
  percent: number
  qualifier?: Qualifier
}

/** A composition exactly as the instrument showed it; kept beside the normalised one. */
export interface ReportedComposition {
  basis: Basis
  air: AirCounting
  /** Step of the display in percent, for example 0.1 or 1. */
  resolution: number
  parts: ReportedPart[]
  /** 0 to 100; absent where the instrument did not measure air. */
  airPercent?: number
  airQualifier?: Qualifier
}

/** One refrigerant of the air-free composition; the three mass fractions are value, lowest and highest possible. */
export interface NormalisedPart {
  substance: Substance
  massFraction: MassFraction
  massFractionLow: MassFraction
  massFractionHigh: MassFraction
  moleFraction: MoleFraction
  belowDetection: boolean
}

export interface NormalisedAir {
  massFraction: MassFraction
  massFractionLow: MassFraction
  massFractionHigh: MassFraction
  moleFraction: MoleFraction
  belowDetection: boolean
}

/** Whether what was reported adds up to 100 within what the display resolution allows. */
export interface SumCheck {
  /** Sum of the reported percentages that should make 100. */
  percent: number
  /** `percent` minus 100. */
  differencePercent: number
  /** What the display explains: one step for each listed part and one for what it leaves out. */
  tolerancePercent: number
  outcome: 'agrees' | 'flagged' | 'refused'
}

/** The refrigerants on an air-free mass basis (mass fractions sum to 1), and air as a share of the whole sample. */
export interface NormalisedComposition {
  /** Version of the normalisation rule; stored with every reading. */
  rule: string
  parts: NormalisedPart[]
  /** null: air was not measured. */
  air: NormalisedAir | null
  sum: SumCheck
}
