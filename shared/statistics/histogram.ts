import { standardDeviationOf, summarise } from './describe'
import { requireAllFinite, requirePositive } from './guards'
import { quantiles } from './quantiles'

export interface Bin {
  /** The lower edge belongs to the bin, the upper one to the next, except in the last bin. */
  lower: number
  upper: number
  count: number
}

export interface Histogram {
  bins: Bin[]
  binWidth: number | null
  reason: string | null
}

/** No more bins than this; a lone far value would otherwise ask for thousands (common practice, no source). */
export const MOST_BINS = 100

/** Freedman and Diaconis 1981, 2 IQR n^(-1/3), or Scott 1979, 3.49 s n^(-1/3), where the quartiles coincide (both from memory). */
function wantedWidth(values: readonly number[]): number {
  const [q1, q3] = quantiles(values, [0.25, 0.75]) as [number, number]
  const root = Math.cbrt(values.length)
  return q3 > q1 ? 2 * (q3 - q1) / root : 3.49 * standardDeviationOf(summarise(values))! / root
}

/**
 * Histogram. With the step of the display known, the width is a multiple of it and the edges lie half a step off,
 * so that no value falls on an edge and no bin holds more steps than its neighbours.
 * @param resolution step of the display in the units of the values
 * @throws RangeError on NaN or infinity or a resolution not above 0.
 */
export function histogram(values: readonly number[], resolution?: number): Histogram {
  requireAllFinite(values, 'values')
  if (resolution !== undefined) requirePositive(resolution, 'resolution')
  if (values.length === 0) return { bins: [], binWidth: null, reason: 'no values' }
  let least = values[0]!
  let most = least
  for (const value of values) {
    if (value < least) least = value
    if (value > most) most = value
  }
  if (least === most) {
    const half = (resolution ?? Math.max(Math.abs(least) * 1e-3, Number.MIN_VALUE * 1e6)) / 2
    return { bins: [{ lower: least - half, upper: least + half, count: values.length }], binWidth: 2 * half, reason: 'all values are equal' }
  }
  const wanted = Math.max(wantedWidth(values), (most - least) / (MOST_BINS - 1))
  const width = resolution === undefined ? wanted : Math.max(1, Math.ceil(wanted / resolution - 1e-9)) * resolution
  const start = resolution === undefined ? least : least - resolution / 2
  const end = resolution === undefined ? most : most + resolution / 2
  const number = Math.max(1, Math.ceil((end - start) / width - 1e-9))
  const bins = Array.from({ length: number }, (_, i): Bin => ({ lower: start + i * width, upper: start + (i + 1) * width, count: 0 }))
  for (const value of values) bins[Math.min(number - 1, Math.floor((value - start) / width))]!.count += 1
  return { bins, binWidth: width, reason: null }
}

export interface DotStack {
  value: number
  count: number
}

/**
 * Dot plot: how many dots stand on each value, ascending. With a step, values are put on the nearest multiple of it.
 * @throws RangeError on NaN or infinity or a step not above 0.
 */
export function dotPlot(values: readonly number[], step?: number): DotStack[] {
  requireAllFinite(values, 'values')
  if (step !== undefined) requirePositive(step, 'step')
  const stacks = new Map<number, DotStack>()
  for (const value of values) {
    const place = step === undefined ? value + 0 : Math.round(value / step)
    const stack = stacks.get(place) ?? { value: step === undefined ? place : place * step + 0, count: 0 }
    stack.count += 1
    stacks.set(place, stack)
  }
  return [...stacks.values()].sort((a, b) => a.value - b.value)
}
