/**
 * The substances that a reading may name: ASHRAE 34 designations from the catalogue, and the two
 * groups that a bench instrument reports when it cannot tell more.
 */
export const DESIGNATIONS = [
  'R-12', 'R-22', 'R-134a', 'R-1234yf', 'R-152a', 'R-290', 'R-600a', 'R-744',
  'R-32', 'R-125', 'R-143a', 'R-404A', 'R-407C', 'R-410A',
] as const

/** `HC`: hydrocarbons not told apart. `OTHER`: not identified. */
export const SUBSTANCE_GROUPS = ['HC', 'OTHER'] as const

export type Designation = (typeof DESIGNATIONS)[number]
export type SubstanceGroup = (typeof SUBSTANCE_GROUPS)[number]
export type Substance = Designation | SubstanceGroup

export const SUBSTANCES: readonly Substance[] = [...DESIGNATIONS, ...SUBSTANCE_GROUPS]

const known: ReadonlySet<string> = new Set(SUBSTANCES)

/** Exact spelling only: a near miss is refused with a hint, never guessed. */
export function isSubstance(text: string): text is Substance {
  return known.has(text)
}

const designations: ReadonlySet<string> = new Set(DESIGNATIONS)

export function isDesignation(text: string): text is Designation {
  return designations.has(text)
}
