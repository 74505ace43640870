import { CATALOGUE, type GwpSet } from './catalogue'
import { isDesignation, type Designation } from './designations'

/** A set has no warming potential for a substance, so nothing can be said in its terms. */
export class NoWarmingPotential extends Error {
  override name = 'NoWarmingPotential'

  constructor(readonly substance: string, readonly set: GwpSet) {
    super(`${set} has no warming potential for ${substance}`)
  }
}

/**
 * Global warming potential over 100 years of a refrigerant or of a mixture by mass fractions (Σ w_i GWP_i,
 * shares need not sum to one), in a named set.
 *
 * @throws NoWarmingPotential, RangeError for an unknown substance or shares that are nothing.
 */
export function warmingPotential({ set, ...of }: { set: GwpSet } & ({ designation: Designation } | { massShares: Record<string, number> })): number {
  const shares = 'designation' in of ? { [of.designation]: 1 } : of.massShares
  let sum = 0
  let total = 0
  for (const [substance, share] of Object.entries(shares)) {
    if (!isDesignation(substance)) throw new RangeError(`${substance} is no refrigerant of the catalogue`)
    if (!(share >= 0)) throw new RangeError(`The share of ${substance} is ${share}`)
    const value = CATALOGUE[substance].gwp[set]
    if (value === null) throw new NoWarmingPotential(substance, set)
    sum += share * value
    total += share
  }
  if (!(total > 0)) throw new RangeError('The shares add up to nothing')
  return sum / total
}

/** Kilograms of CO2 with the same warming over 100 years, in the named set. @throws as {@link warmingPotential} */
export function carbonDioxideEquivalentKilograms({ massKilograms, ...of }: { massKilograms: number, set: GwpSet } & ({ designation: Designation } | { massShares: Record<string, number> })): number {
  return massKilograms * warmingPotential(of)
}
