/**
 * Refusals at the door of the statistics. NaN and infinities never enter, so they never leave;
 * the message of each RangeError names the argument.
 */

/** @throws RangeError when `value` is NaN or infinite. */
export function requireFinite(value: number, name: string): void {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be a finite number, not ${value}`)
}

/** @throws RangeError when any of `values` is NaN or infinite. */
export function requireAllFinite(values: readonly number[], name: string): void {
  for (let i = 0; i < values.length; i += 1) {
    if (!Number.isFinite(values[i])) throw new RangeError(`${name}[${i}] must be a finite number, not ${values[i]}`)
  }
}

/** @throws RangeError unless 0 < value < 1. */
export function requireOpenUnit(value: number, name: string): void {
  if (!(value > 0 && value < 1)) throw new RangeError(`${name} must lie between 0 and 1, both excluded, not ${value}`)
}

/** @throws RangeError unless 0 <= value <= 1. */
export function requireUnit(value: number, name: string): void {
  if (!(value >= 0 && value <= 1)) throw new RangeError(`${name} must lie between 0 and 1, not ${value}`)
}

/** @throws RangeError unless value is finite and above zero. */
export function requirePositive(value: number, name: string): void {
  if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`${name} must be a finite number above 0, not ${value}`)
}

/** @throws RangeError unless value is finite and not negative. */
export function requireNotNegative(value: number, name: string): void {
  if (!(value >= 0 && Number.isFinite(value))) throw new RangeError(`${name} must be a finite number of 0 or more, not ${value}`)
}

/** @throws RangeError unless value is a whole number from `least` up to `most`. */
export function requireWhole(value: number, name: string, least: number, most = Number.MAX_SAFE_INTEGER): void {
  if (!Number.isSafeInteger(value) || value < least || value > most) {
    const range = most === Number.MAX_SAFE_INTEGER ? `of ${least} or more` : `from ${least} to ${most}`
    throw new RangeError(`${name} must be a whole number ${range}, not ${value}`)
  }
}

/** @throws RangeError unless both lists have the same length. */
export function requireSameLength(a: readonly unknown[], aName: string, b: readonly unknown[], bName: string): void {
  if (a.length !== b.length) throw new RangeError(`${aName} and ${bName} must have the same length, not ${a.length} and ${b.length}`)
}
