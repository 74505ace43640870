import { fUpper } from './distributions'
import { exactSum, pairMean } from './exact-sum'
import { requireFinite, requirePositive, requireUnit } from './guards'

export interface AnovaRow {
  sumOfSquares: number
  df: number
  meanSquare: number
  f: number | null
  p: number | null
}

export interface GaugeComponents {
  /** Variances, negative ones set to 0 (see `negative`). */
  repeatability: number
  operator: number
  interaction: number
  /** operator + interaction. */
  reproducibility: number
  /** repeatability + reproducibility. */
  gauge: number
  part: number
  total: number
}

/** For gauge, repeatability, reproducibility and part. */
export interface GaugeShares {
  gauge: number
  repeatability: number
  reproducibility: number
  part: number
}

export interface GaugeStudy {
  part: AnovaRow
  operator: AnovaRow
  interaction: AnovaRow
  /** Pure repeats. */
  error: AnovaRow
  /** Whether the interaction was pooled with the repeats. */
  pooled: boolean
  components: GaugeComponents
  /** Components whose estimate was negative and is given as 0. */
  negative: ('operator' | 'interaction' | 'part')[]
  /** Standard deviation in percent of the total one; null without any spread. */
  percentStudy: GaugeShares | null
  /** 600 σ / tolerance width; null without a tolerance. */
  percentTolerance: GaugeShares | null
  /** Number of distinct categories, floor(√2 σ_part/σ_gauge); null when the gauge shows no spread. */
  distinctCategories: number | null
  reason: null
}

export type GaugeStudyResult = GaugeStudy | { reason: string }

export interface GaugeStudySettings {
  /** The interaction is pooled when its p is above this; null keeps it always. */
  poolAboveP: number | null
  /** Width of the tolerance in the units of the readings. */
  toleranceWidth?: number
}

function row(sumOfSquares: number, df: number, against: { meanSquare: number, df: number } | null): AnovaRow {
  const meanSquare = sumOfSquares / df
  const f = against === null || against.meanSquare === 0 ? null : meanSquare / against.meanSquare
  return { sumOfSquares, df, meanSquare, f, p: f === null ? null : fUpper(f, df, against!.df) }
}

/**
 * Crossed repeatability and reproducibility study by analysis of variance: every operator measures every part equally often.
 * An unbalanced study is refused with words. A destructive or drifting sample isn't a repeat.
 * Source: AIAG Measurement Systems Analysis, 4th edition, chapter III-B, ANOVA method (its published example reproduced).
 * @param readings readings[part][operator][trial]
 * @throws RangeError on NaN or infinity or a wrong setting.
 */
export function gaugeStudy(readings: readonly (readonly (readonly number[])[])[], settings: GaugeStudySettings): GaugeStudyResult {
  readings.forEach((part, i) => part.forEach((trials, j) => trials.forEach((value, k) => requireFinite(value, `readings[${i}][${j}][${k}]`))))
  if (settings.poolAboveP !== null) requireUnit(settings.poolAboveP, 'poolAboveP')
  if (settings.toleranceWidth !== undefined) requirePositive(settings.toleranceWidth, 'toleranceWidth')
  const p = readings.length
  const o = readings[0]?.length ?? 0
  const r = readings[0]?.[0]?.length ?? 0
  if (readings.some(part => part.length !== o || part.some(trials => trials.length !== r))) {
    return { reason: 'unbalanced: every operator must measure every part equally often' }
  }
  if (p < 2 || o < 2 || r < 2) return { reason: 'needs at least two parts, two operators and two trials' }

  const cells = readings.map(part => part.map(trials => pairMean(trials).high))
  const grand = pairMean(readings.flat(2)).high
  const partMeans = readings.map(part => pairMean(part.flat()).high)
  const operatorMeans = cells[0]!.map((_, j) => pairMean(readings.flatMap(part => part[j]!)).high)
  const ssPart = o * r * exactSum(partMeans.map(mean => (mean - grand) ** 2))
  const ssOperator = p * r * exactSum(operatorMeans.map(mean => (mean - grand) ** 2))
  const ssInteraction = r * exactSum(cells.flatMap((line, i) =>
    line.map((mean, j) => ((mean - partMeans[i]!) - (operatorMeans[j]! - grand)) ** 2)))
  const ssError = exactSum(readings.flatMap((part, i) => part.flatMap((trials, j) =>
    trials.map(value => (value - cells[i]![j]!) ** 2))))

  const error = row(ssError, p * o * (r - 1), null)
  const interaction = row(ssInteraction, (p - 1) * (o - 1), error)
  const pooled = settings.poolAboveP !== null && interaction.p !== null && interaction.p > settings.poolAboveP
  const residual = pooled ? row(ssInteraction + ssError, interaction.df + error.df, null) : error
  const below = pooled ? residual : interaction
  const part = row(ssPart, p - 1, below)
  const operator = row(ssOperator, o - 1, below)

  const negative: GaugeStudy['negative'] = []
  const component = (name: GaugeStudy['negative'][number], estimate: number): number => {
    if (estimate < 0) negative.push(name)
    return Math.max(0, estimate)
  }
  const repeatability = residual.meanSquare
  const interactionVariance = pooled ? 0 : component('interaction', (interaction.meanSquare - error.meanSquare) / r)
  const operatorVariance = component('operator', (operator.meanSquare - below.meanSquare) / (p * r))
  const partVariance = component('part', (part.meanSquare - below.meanSquare) / (o * r))
  const reproducibility = operatorVariance + interactionVariance
  const gauge = repeatability + reproducibility
  const total = gauge + partVariance
  const shares = (per: number): GaugeShares => ({
    gauge: Math.sqrt(gauge) * per,
    repeatability: Math.sqrt(repeatability) * per,
    reproducibility: Math.sqrt(reproducibility) * per,
    part: Math.sqrt(partVariance) * per,
  })
  return {
    part,
    operator,
    interaction,
    error,
    pooled,
    components: {
      repeatability, operator: operatorVariance, interaction: interactionVariance, reproducibility, gauge, part: partVariance, total,
    },
    negative,
    percentStudy: total === 0 ? null : shares(100 / Math.sqrt(total)),
    percentTolerance: settings.toleranceWidth === undefined ? null : shares(600 / settings.toleranceWidth),
    distinctCategories: gauge === 0 ? null : Math.floor(Math.SQRT2 * Math.sqrt(partVariance / gauge)),
    reason: null,
  }
}
