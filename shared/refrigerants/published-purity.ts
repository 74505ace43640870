import type { SourceMark } from '../verdict/types'

/** `recycled` gas may go back into a vehicle; `new` is what a maker delivers for vehicles; `in vehicle` is what may be recycled on site. */
export type PurityState = 'recycled' | 'new' | 'in vehicle'

export interface PublishedLimit {
  refrigerant: string
  state: PurityState
  quantity: string
  max?: number
  min?: number
  unit: string
  standard: string
  mark: SourceMark
}

const weight = 'ppm by weight'

/**
 * Published purity limits, for reference. Those of recycled gas are liquid-phase limits met by certifying
 * the machine; a bench instrument measures neither moisture nor oil, so no reading is ever held against them.
 */
export const PUBLISHED_PURITY: readonly PublishedLimit[] = [
  { refrigerant: 'R-12', state: 'recycled', quantity: 'moisture', max: 15, unit: weight, standard: 'SAE J1991', mark: 'from memory' },
  { refrigerant: 'R-12', state: 'recycled', quantity: 'lubricant', max: 4000, unit: weight, standard: 'SAE J1991', mark: 'from memory' },
  { refrigerant: 'R-12', state: 'recycled', quantity: 'non-condensables', max: 330, unit: weight, standard: 'SAE J1991', mark: 'from memory' },
  ...['R-134a', 'R-1234yf'].flatMap((refrigerant): PublishedLimit[] => [
    { refrigerant, state: 'recycled', quantity: 'moisture', max: 50, unit: weight, standard: 'SAE J2099', mark: 'from memory' },
    { refrigerant, state: 'recycled', quantity: 'lubricant', max: 500, unit: weight, standard: 'SAE J2099', mark: 'verified' },
    { refrigerant, state: 'recycled', quantity: 'non-condensables', max: 150, unit: weight, standard: 'SAE J2099', mark: 'from memory' },
    { refrigerant, state: 'in vehicle', quantity: 'purity', min: 98, unit: 'percent', standard: 'SAE J2099', mark: 'verified' },
  ]),
  ...([['R-134a', 'SAE J2776', 10], ['R-1234yf', 'SAE J2844', 25]] as const).flatMap(([refrigerant, standard, moisture]): PublishedLimit[] => [
    { refrigerant, state: 'new', quantity: 'moisture', max: moisture, unit: weight, standard, mark: 'verified' },
    { refrigerant, state: 'new', quantity: 'volatile impurities', max: 0.5, unit: 'percent by weight', standard, mark: 'verified' },
    { refrigerant, state: 'new', quantity: 'non-condensables', max: 1.5, unit: 'percent by volume, vapour phase, 23.9 C', standard, mark: 'verified' },
    { refrigerant, state: 'new', quantity: 'high-boiling residue', max: 0.01, unit: 'percent by volume', standard, mark: 'verified' },
    { refrigerant, state: 'new', quantity: 'acidity', max: 1, unit: weight, standard, mark: 'verified' },
  ]),
]

/** The published limit of one quantity; null where none is known here. */
export function publishedLimit({ refrigerant, state, quantity }: { refrigerant: string, state: PurityState, quantity: string }): PublishedLimit | null {
  return PUBLISHED_PURITY.find(limit => limit.refrigerant === refrigerant && limit.state === state && limit.quantity === quantity) ?? null
}

/** Least share of the charge that a recovery machine must take out, and in what time (SAE J2788:2020). */
export const RECOVERY_EFFICIENCY = { min: 95, unit: 'percent', within_minutes: 30, standard: 'SAE J2788' } as const
