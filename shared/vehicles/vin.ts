/** Letter values of 49 CFR 565.15(c), table III; I, O and Q do not occur. */
const VALUES: Readonly<Record<string, number>> = {
  A: 1, B: 2, C: 3, D: 4, E: 5, F: 6, G: 7, H: 8, J: 1, K: 2, L: 3, M: 4, N: 5, P: 7, R: 9, S: 2, T: 3, U: 4, V: 5, W: 6, X: 7, Y: 8, Z: 9,
  0: 0, 1: 1, 2: 2, 3: 3, 4: 4, 5: 5, 6: 6, 7: 7, 8: 8, 9: 9,
}
/** Weights by position, 49 CFR 565.15(c), table IV; the check digit itself weighs nothing. */
const WEIGHTS = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2]
const CHECK_POSITION = 9
const YEAR_POSITION = 10
/** Position 10 from 1980 on; the letters begin again in 2010 (49 CFR 565.15, table VII). */
const YEAR_CODES = 'ABCDEFGHJKLMNPRSTVWXY123456789'

export interface VinCheck {
  /** True where length, characters and check digit fit. False is a warning, never a refusal: vehicles for other markets need no check digit. */
  valid: boolean
  reason: 'length' | 'forbidden character' | 'check digit' | null
  length: number
  /** Position of the first forbidden character, from 1; null where there is none. */
  position: number | null
  /** Weighted sum, its remainder by 11 and the digit that it calls for; null where length or characters are wrong. */
  sum: number | null
  remainder: number | null
  checkDigit: string | null
  /** What stands in position 9. */
  position9: string | null
}

/** Capitals without spaces, hyphens and points: VINs are written in many ways. Nothing is guessed: an O stays an O. */
export function normaliseVin(text: string): string {
  return text.toUpperCase().replace(/[\s.\-_/·*]/g, '')
}

/** Weighted sum of 17 allowed characters (49 CFR 565.15(c)). */
function weightedSum(vin: string): number {
  let sum = 0
  for (let i = 0; i < 17; i++) sum += VALUES[vin[i]!]! * WEIGHTS[i]!
  return sum
}

const digitOf = (remainder: number): string => (remainder === 10 ? 'X' : String(remainder))

/** Length, characters and check digit of a VIN (49 CFR 565.13 and 565.15), after {@link normaliseVin}. */
export function checkVin({ vin }: { vin: string }): VinCheck {
  const text = normaliseVin(vin)
  const nothing = { length: text.length, sum: null, remainder: null, checkDigit: null, position9: text[CHECK_POSITION - 1] ?? null }
  const forbidden = [...text].findIndex(character => VALUES[character] === undefined)
  if (forbidden >= 0) return { valid: false, reason: 'forbidden character', position: forbidden + 1, ...nothing }
  if (text.length !== 17) return { valid: false, reason: 'length', position: null, ...nothing }
  const sum = weightedSum(text)
  const remainder = sum % 11
  const checkDigit = digitOf(remainder)
  const position9 = text[CHECK_POSITION - 1]!
  const valid = position9 === checkDigit
  return { valid, reason: valid ? null : 'check digit', length: 17, position: null, sum, remainder, checkDigit, position9 }
}

export interface ModelYear {
  /** The year that position 7 points to; null where position 10 is no year. */
  modelYear: number | null
  /** Every year that position 10 may mean, oldest first. */
  candidates: number[]
}

/**
 * Model year from position 10; for passenger cars and light vehicles position 7 tells the cycle: a digit
 * 1980 to 2009, a letter 2010 to 2039 (49 CFR 565.15(b), 565.25(b)). Elsewhere position 10 need not be a year.
 */
export function modelYearOf({ vin }: { vin: string }): ModelYear {
  const text = normaliseVin(vin)
  const index = text.length === 17 ? YEAR_CODES.indexOf(text[YEAR_POSITION - 1]!) : -1
  if (index < 0) return { modelYear: null, candidates: [] }
  const candidates = [1980 + index, 2010 + index]
  return { modelYear: /\d/.test(text[6]!) ? candidates[0]! : candidates[1]!, candidates }
}

/** Puts the right check digit into position 9 of 17 allowed characters, whatever stood there: for invented VINs. @throws RangeError */
export function withCheckDigit(vin: string): string {
  const text = normaliseVin(vin)
  const check = checkVin({ vin: text })
  if (check.checkDigit === null) throw new RangeError(`No VIN can be made of ${vin}: ${check.reason}`)
  return text.slice(0, CHECK_POSITION - 1) + check.checkDigit + text.slice(CHECK_POSITION)
}
