/** An interval, or the plain reason why there is none. */
export type Interval =
  | { lower: number, upper: number, reason: null }
  | { lower: null, upper: null, reason: string }

export function interval(lower: number, upper: number): Interval {
  return { lower, upper, reason: null }
}

export function noInterval(reason: string): Interval {
  return { lower: null, upper: null, reason }
}
