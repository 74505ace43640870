import { requireFinite } from './guards'

/** One point of a chart with the limits that hold for it. */
export interface ChartPoint {
  /** null: missing, drawn as a gap. */
  value: number | null
  lower: number | null
  upper: number | null
  /** Strictly outside: a point on the limit isn't beyond it. null value: false. */
  beyond: boolean
}

/** A missing value (null) or a change of conditions (its position in `breaks`) parts a series into stretches. */
export type Series = readonly (number | null)[]

/** @throws RangeError on NaN or infinity. */
export function requireSeries(series: Series, name: string): number[] {
  const values: number[] = []
  series.forEach((value, i) => {
    if (value === null) return
    requireFinite(value, `${name}[${i}]`)
    values.push(value)
  })
  return values
}

/** The point with its limits. */
export function chartPoint(value: number | null, lower: number, upper: number): ChartPoint {
  return { value, lower, upper, beyond: value !== null && (value < lower || value > upper) }
}
