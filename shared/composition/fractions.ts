import type { Substance } from '../refrigerants/designations'
import { molarMassGramsPerMole } from '../refrigerants/molar-mass'
import type { MassFraction, MoleFraction } from './types'

/** A substance of a mixture, air included. */
export type Component = Substance | 'air'

const sumOf = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0)

function entriesOf(fractions: Partial<Record<Component, number>>): [Component, number][] {
  const entries = Object.entries(fractions) as [Component, number][]
  for (const [component, value] of entries) {
    if (!(value >= 0 && Number.isFinite(value))) throw new RangeError(`The share of ${component} is ${value}; it must be a number of at least 0`)
  }
  if (!(sumOf(entries.map(([, value]) => value)) > 0)) throw new RangeError('The shares add up to nothing')
  return entries
}

/**
 * Mole fractions from mass shares: x_i = (w_i / M_i) / Σ (w_j / M_j). Shares need not sum to one; the
 * answer does. Groups count with their central molar mass.
 *
 * @throws RangeError where a share is negative or no number, or all are zero.
 */
export function moleFractionsFromMass(massShares: Partial<Record<Component, number>>): Partial<Record<Component, MoleFraction>> {
  const entries = entriesOf(massShares)
  const amounts = entries.map(([component, share]) => share / molarMassGramsPerMole(component))
  const total = sumOf(amounts)
  return Object.fromEntries(entries.map(([component], i) => [component, amounts[i]! / total as MoleFraction]))
}

/**
 * Mass fractions from mole shares: w_i = x_i M_i / Σ x_j M_j. Shares need not sum to one; the answer does.
 *
 * @throws RangeError where a share is negative or no number, or all are zero.
 */
export function massFractionsFromMole(moleShares: Partial<Record<Component, number>>): Partial<Record<Component, MassFraction>> {
  const entries = entriesOf(moleShares)
  const masses = entries.map(([component, share]) => share * molarMassGramsPerMole(component))
  const total = sumOf(masses)
  return Object.fromEntries(entries.map(([component], i) => [component, masses[i]! / total as MassFraction]))
}

/** Mean molar mass of a mixture in grams per mole, from mass shares: Σ w / Σ (w / M). */
export function meanMolarMassGramsPerMole(massShares: Partial<Record<Component, number>>): number {
  const entries = entriesOf(massShares)
  return sumOf(entries.map(([, share]) => share)) / sumOf(entries.map(([component, share]) => share / molarMassGramsPerMole(component)))
}

/** Percent from parts per million, both by mass. */
export const percentFromPartsPerMillion = (partsPerMillion: number): number => partsPerMillion / 10_000
/** Parts per million from percent, both by mass. */
export const partsPerMillionFromPercent = (percent: number): number => percent * 10_000
