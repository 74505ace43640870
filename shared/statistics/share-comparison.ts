import { benjaminiHochberg } from './adjust'
import { requireOpenUnit } from './guards'
import { compareTwoShares, type Share, type TwoShares } from './proportions'

export interface NamedShare extends Share {
  name: string
}

export interface ShareQuestion {
  name: string
  /** The share asked about, and what it is set against. */
  a: Share
  b: Share
}

export type ShareFound = 'higher' | 'lower' | 'no difference shown' | 'not enough data to tell'

export interface ShareAnswer {
  name: string
  test: TwoShares
  /** Benjamini and Hochberg's adjusted p over all questions that could be tested. */
  adjustedP: number | null
  found: ShareFound
  words: string
}

function wordsOf(name: string, found: ShareFound, test: TwoShares): string {
  if (found === 'not enough data to tell') return `${name}: not enough data to tell (${test.reason}).`
  if (found === 'no difference shown') return `${name}: no difference shown; that does not prove that there is none.`
  return `${name}: ${found}, also after allowing for the number of comparisons.`
}

/**
 * Many pairs of shares at once (this month against last, each shop against the rest), each by the pooled two-proportion test,
 * with Benjamini and Hochberg's correction over those that can be tested. A pair with an expected count below 5 is not tested.
 * Count vehicles, not readings.
 * @param confidence for example 0.95; 1 - confidence is the share of false alarms among those raised
 * @throws RangeError unless the counts are whole and fit, and 0 < confidence < 1.
 */
export function compareManyShares(questions: readonly ShareQuestion[], confidence: number): ShareAnswer[] {
  requireOpenUnit(confidence, 'confidence')
  const tests = questions.map(({ a, b }) => compareTwoShares(a, b, confidence))
  const testable = tests.filter(test => test.dependable)
  const adjusted = benjaminiHochberg(testable.map(test => test.p!))
  return questions.map(({ name }, i) => {
    const test = tests[i]!
    const place = testable.indexOf(test)
    const adjustedP = place < 0 ? null : adjusted[place]!
    const found: ShareFound = adjustedP === null
      ? 'not enough data to tell'
      : adjustedP > 1 - confidence ? 'no difference shown' : test.difference! > 0 ? 'higher' : 'lower'
    return { name, test, adjustedP, found, words: wordsOf(name, found, test) }
  })
}

/**
 * Each group against all others together, corrected for the number of groups; see `compareManyShares`.
 * @throws RangeError unless the counts are whole and fit, and 0 < confidence < 1.
 */
export function compareEachWithRest(groups: readonly NamedShare[], confidence: number): ShareAnswer[] {
  const x = groups.reduce((sum, group) => sum + group.x, 0)
  const n = groups.reduce((sum, group) => sum + group.n, 0)
  return compareManyShares(groups.map(group => ({
    name: group.name,
    a: { x: group.x, n: group.n },
    b: { x: x - group.x, n: n - group.n },
  })), confidence)
}
