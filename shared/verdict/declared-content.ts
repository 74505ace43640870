import { CATALOGUE } from '../refrigerants/catalogue'
import type { Designation, Substance } from '../refrigerants/designations'

/**
 * Components between this share and its reciprocal of what the blend holds of them are the blend: the
 * vapour of R-407C holds about a third of each, not 23/25/52. Common practice, no source.
 */
const LEAST_OF_NOMINAL = 0.5

interface Part { substance: Substance, massFraction: number }

/**
 * An instrument that names the components of the declared blend apart has found the blend, not a
 * contamination, provided that all of them are there in about its proportions: R-134a alone is no R-404A.
 * False for a declared single substance.
 */
export function showsBlend(declared: Designation, parts: readonly Part[]): boolean {
  const { blend } = CATALOGUE[declared]
  if (blend === null) return false
  let together = 0
  for (const { substance, massFraction } of parts) if (blend[substance as Designation] !== undefined) together += massFraction
  for (const name in blend) {
    const nominal = blend[name as Designation]! / 100
    const found = parts.find(({ substance }) => substance === name)?.massFraction ?? 0
    if (found < LEAST_OF_NOMINAL * nominal * together || found > nominal * together / LEAST_OF_NOMINAL || found === 0) return false
  }
  return true
}

/** Is the part the declared refrigerant, or a component of the declared blend where the sample shows it? */
export function belongsTo(declared: Designation, substance: Substance, blendShown: boolean): boolean {
  return substance === declared || (blendShown && CATALOGUE[declared].blend?.[substance as Designation] !== undefined)
}
