/** A state outside the range for which a formula was fitted: it is refused, never extrapolated. */
export class OutOfRange extends RangeError {
  override name = 'OutOfRange'

  constructor(readonly quantity: string, readonly value: number, readonly low: number, readonly high: number, readonly unit: string) {
    super(`${quantity} ${value} ${unit} lies outside ${low} to ${high} ${unit}`)
  }
}
