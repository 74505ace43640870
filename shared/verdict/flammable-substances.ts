import type { Designation, Substance } from '../refrigerants/designations'

/** Components of the blends in the catalogue (ASHRAE 34): an instrument that names them apart has found the blend, not a contamination. */
const BLENDS: Partial<Record<Designation, readonly Substance[]>> = {
  'R-404A': ['R-125', 'R-143a', 'R-134a'],
  'R-407C': ['R-32', 'R-125', 'R-134a'],
  'R-410A': ['R-32', 'R-125'],
}

/** ASHRAE 34 classes 3 and 2, and hydrocarbons not told apart. */
const FLAMMABLE: ReadonlySet<Substance> = new Set<Substance>(['HC', 'R-290', 'R-600a', 'R-152a'])
/** ASHRAE 34 class 2L. */
const MILDLY_FLAMMABLE: ReadonlySet<Substance> = new Set<Substance>(['R-1234yf', 'R-32', 'R-143a'])

/**
 * From this share on, a foreign 2L refrigerant makes the content flammable. R-513A, 56 % R-1234yf with
 * 44 % R-134a, is still class A1 in ASHRAE 34 (from memory); below that a mixture of the two is judged as
 * foreign refrigerant only.
 */
export const MILDLY_FLAMMABLE_PERCENT = 50

/** True for the declared refrigerant itself and for the components of a declared blend. */
export function belongsTo(declared: Designation, substance: Substance): boolean {
  return substance === declared || BLENDS[declared]?.includes(substance) === true
}

export const isFlammable = (substance: Substance): boolean => FLAMMABLE.has(substance)
export const isMildlyFlammable = (substance: Substance): boolean => MILDLY_FLAMMABLE.has(substance)
