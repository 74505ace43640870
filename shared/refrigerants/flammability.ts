/** Litres that a mole of ideal gas takes at 25 °C and 101.325 kPa. */
const MOLAR_VOLUME_LITRES = 24.465

/**
 * Lower flammable limit of a mixture of fuels by Le Chatelier: 1 / Σ(x_i / LFL_i), x_i the fuel's share of
 * the fuels. The rule has no term for a part that does not burn, so one is refused: a shop's mixture of
 * refrigerant and hydrocarbon must never be computed into "not flammable".
 *
 * @param volumeParts amounts by volume; they need not sum to one.
 * @param lowerLimits of each fuel, percent by volume in air.
 * @returns percent by volume in air.
 * @throws RangeError
 */
export function lowerFlammableLimitVolumePercent({ volumeParts, lowerLimits }: { volumeParts: Record<string, number>, lowerLimits: Record<string, number | null> }): number {
  const entries = Object.entries(volumeParts).filter(([, amount]) => amount > 0)
  const total = entries.reduce((sum, [, amount]) => sum + amount, 0)
  if (!(total > 0)) throw new RangeError('The parts add up to nothing')
  let inverse = 0
  for (const [fuel, amount] of entries) {
    const limit = lowerLimits[fuel]
    if (!limit || !(limit > 0)) throw new RangeError(`${fuel} has no lower flammable limit; the rule holds for fuels only`)
    inverse += amount / total / limit
  }
  return 1 / inverse
}

/** A limit in kg/m³ at 25 °C and 101.325 kPa from percent by volume, as an ideal gas. */
export function flammableLimitKilogramsPerCubicMetre({ volumePercent, molarMassGramsPerMole }: { volumePercent: number, molarMassGramsPerMole: number }): number {
  return volumePercent / 100 * molarMassGramsPerMole / MOLAR_VOLUME_LITRES
}
