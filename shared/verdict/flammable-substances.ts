import { CATALOGUE, type SafetyClass } from '../refrigerants/catalogue'
import { DESIGNATIONS, type Designation, type Substance } from '../refrigerants/designations'

/** Parts of each blend: an instrument that names them apart has found the blend, not a contamination. */
const BLEND_PARTS: ReadonlyMap<Designation, ReadonlySet<string>> = new Map(
  DESIGNATIONS.flatMap((designation) => {
    const { blend } = CATALOGUE[designation]
    return blend ? [[designation, new Set(Object.keys(blend))] as const] : []
  }),
)

const ofClass = (...classes: SafetyClass[]): Substance[] => DESIGNATIONS.filter(designation => classes.includes(CATALOGUE[designation].safetyClass.value))

/** ASHRAE 34 classes 3 and 2, and hydrocarbons not told apart. */
const FLAMMABLE: ReadonlySet<Substance> = new Set<Substance>(['HC', ...ofClass('A2', 'A3')])
/** ASHRAE 34 class 2L. */
const MILDLY_FLAMMABLE: ReadonlySet<Substance> = new Set(ofClass('A2L'))

/**
 * From this share on, a foreign 2L refrigerant makes the content flammable. R-513A, 56 % R-1234yf with
 * 44 % R-134a, is still class A1 in ASHRAE 34 (from memory); below that a mixture of the two is judged as
 * foreign refrigerant only.
 */
export const MILDLY_FLAMMABLE_PERCENT = 50

/** True for the declared refrigerant itself and for the components of a declared blend. */
export function belongsTo(declared: Designation, substance: Substance): boolean {
  return substance === declared || BLEND_PARTS.get(declared)?.has(substance) === true
}

export const isFlammable = (substance: Substance): boolean => FLAMMABLE.has(substance)
export const isMildlyFlammable = (substance: Substance): boolean => MILDLY_FLAMMABLE.has(substance)
