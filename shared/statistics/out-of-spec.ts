import { requireAllFinite, requireFinite, requireOpenUnit, requireSameLength } from './guards'
import { type Interval } from './interval'
import { wilsonInterval } from './proportions'

/** Limits in the units of the values; either or both. */
export interface SpecificationLimits {
  lower?: number
  upper?: number
}

/** @throws RangeError on NaN, infinity, no limit at all, or limits that cross. */
export function requireLimits(limits: SpecificationLimits): void {
  const { lower, upper } = limits
  if (lower === undefined && upper === undefined) throw new RangeError('limits must hold a lower or an upper limit')
  if (lower !== undefined) requireFinite(lower, 'limits.lower')
  if (upper !== undefined) requireFinite(upper, 'limits.upper')
  if (lower !== undefined && upper !== undefined && lower >= upper) throw new RangeError('limits.lower must lie below limits.upper')
}

/** A value on the limit is inside. */
export function isOutside(value: number, limits: SpecificationLimits): boolean {
  return (limits.lower !== undefined && value < limits.lower) || (limits.upper !== undefined && value > limits.upper)
}

export interface OutOfSpecShare {
  /** Vehicles (or values, where no vehicles are given) outside, and all of them. */
  outside: number
  n: number
  share: number | null
  /** Wilson's interval. */
  interval: Interval
}

/**
 * Share of vehicles out of specification with Wilson's interval. Repeats of one vehicle aren't independent: with `subjects`
 * a vehicle counts once, as outside when any of its values is.
 * @param subjects of the values, in their order
 * @throws RangeError on NaN or infinity, wrong limits or confidence, or lists of different length.
 */
export function outOfSpecShare(values: readonly number[], limits: SpecificationLimits, confidence: number, subjects?: readonly string[]): OutOfSpecShare {
  requireAllFinite(values, 'values')
  requireLimits(limits)
  requireOpenUnit(confidence, 'confidence')
  if (subjects) requireSameLength(values, 'values', subjects, 'subjects')
  const found = new Map<string | number, boolean>()
  values.forEach((value, i) => {
    const subject = subjects ? subjects[i]! : i
    found.set(subject, (found.get(subject) ?? false) || isOutside(value, limits))
  })
  const n = found.size
  const outside = [...found.values()].filter(Boolean).length
  return { outside, n, share: n === 0 ? null : outside / n, interval: wilsonInterval(outside, n, confidence) }
}
