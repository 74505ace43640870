import { SUBSTANCES, type Substance } from '../refrigerants/designations'

const MOST_SUGGESTIONS = 3

/**
 * Known names that lie close to what was written, nearest first: for a hint, never for a guess.
 * Close: equal but for case and punctuation, or within two edits (Levenshtein) of it.
 */
export function nearestSubstances(text: string, among: readonly Substance[] = SUBSTANCES): Substance[] {
  const wanted = plain(text.slice(0, 40))
  return among
    .map(substance => ({ substance, distance: editDistance(wanted, plain(substance)) }))
    .filter(({ substance, distance }) => distance <= 2 && distance < plain(substance).length)
    .sort((a, b) => a.distance - b.distance)
    .slice(0, MOST_SUGGESTIONS)
    .map(({ substance }) => substance)
}

function plain(text: string): string {
  return text.toUpperCase().replace(/[^A-Z0-9]/g, '')
}

/** Levenshtein distance. */
function editDistance(a: string, b: string): number {
  let above = Array.from({ length: b.length + 1 }, (_, column) => column)
  for (let row = 1; row <= a.length; row++) {
    const current = [row]
    for (let column = 1; column <= b.length; column++) {
      const substitution = above[column - 1]! + (a[row - 1] === b[column - 1] ? 0 : 1)
      current.push(Math.min(substitution, above[column]! + 1, current[column - 1]! + 1))
    }
    above = current
  }
  return above[b.length]!
}
