import { NOT_REPORTED, type JudgedSample, type Quantity } from './sample'

/** 99 % points of chi-square for 1 to 9 degrees of freedom (NIST/SEMATECH e-Handbook 1.3.6.7.4). */
const CHI_SQUARE_99 = [6.635, 9.210, 11.345, 13.277, 15.086, 16.812, 18.475, 20.090, 21.666]

/** After a sample that disagrees with the others, so many that agree must follow before it is passed over. */
const AGREEING_AFTER_OUTLIER = 3

/** Σ (x − x̄)²/u² of one quantity against chi-square with n − 1 degrees of freedom, at 99 %; of the samples that reported it. */
function agree(quantities: Quantity[]): boolean {
  const reported = quantities.filter(q => q !== NOT_REPORTED)
  const n = reported.length
  if (n < 2) return true
  const mean = reported.reduce((sum, q) => sum + q.percent, 0) / n
  let chi2 = 0
  for (const { percent, u } of reported) chi2 += u > 0 ? ((percent - mean) / u) ** 2 : percent === mean ? 0 : Infinity
  return chi2 <= CHI_SQUARE_99[Math.min(n - 2, CHI_SQUARE_99.length - 1)]!
}

/**
 * Do all samples show the same gas: the declared refrigerant, flammable and unidentified content, and each
 * foreign refrigerant? Air is left out: it gathers at the top of a charge and differs with what was drawn before.
 */
function consistent(samples: JudgedSample[]): boolean {
  if (samples.length < 2) return true
  if (!agree(samples.map(({ purity }) => purity)) || !agree(samples.map(({ flammable }) => flammable)) || !agree(samples.map(({ unknown }) => unknown))) return false
  const substances = new Set(samples.flatMap(({ foreign }) => foreign.map(({ substance }) => substance)))
  return [...substances].every(substance => agree(samples.map(({ foreign }) => foreign.find(entry => entry.substance === substance)?.quantity ?? NOT_REPORTED)))
}

export interface CombinedSamples {
  /** The samples that are judged together, oldest first. */
  used: JudgedSample[]
  /** False where they disagree and nothing settles it. */
  consistent: boolean
  /** Earlier samples that were passed over because enough later ones agree among themselves. */
  passedOver: number
}

/**
 * Which samples of one visit are judged together: all, where they agree; else the latest that agree, if
 * there are three of them; else none settles it. All are kept and counted whatever comes out.
 */
export function combineSamples(samples: JudgedSample[]): CombinedSamples {
  if (consistent(samples)) return { used: samples, consistent: true, passedOver: 0 }
  for (let from = 1; from <= samples.length - AGREEING_AFTER_OUTLIER; from++) {
    const latest = samples.slice(from)
    if (consistent(latest)) return { used: latest, consistent: true, passedOver: from }
  }
  return { used: samples, consistent: false, passedOver: 0 }
}
