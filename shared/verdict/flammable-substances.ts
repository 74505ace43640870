import { CATALOGUE } from '../refrigerants/catalogue'
import { DESIGNATIONS, type Substance } from '../refrigerants/designations'

/** ASHRAE 34 classes 2 and 3, and hydrocarbons not told apart. */
const FLAMMABLE: ReadonlySet<Substance> = new Set<Substance>(['HC', ...DESIGNATIONS.filter(name => ['A2', 'A3'].includes(CATALOGUE[name].safetyClass.value))])
/** ASHRAE 34 class 2L. */
const MILDLY_FLAMMABLE: ReadonlySet<Substance> = new Set<Substance>(DESIGNATIONS.filter(name => CATALOGUE[name].safetyClass.value === 'A2L'))

export const isFlammable = (substance: Substance): boolean => FLAMMABLE.has(substance)
export const isMildlyFlammable = (substance: Substance): boolean => MILDLY_FLAMMABLE.has(substance)
