/**
 * RFC 3339 `date-time` with an offset, upper-case T and Z, to the microsecond at most (what PostgreSQL keeps).
 * A leap second (:60) is not taken: JavaScript has no such instant.
 */
export const SAMPLING_TIME_PATTERN = /^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])T([01]\d|2[0-3]):[0-5]\d:[0-5]\d(\.\d{1,6})?(Z|[+-]([01]\d|2[0-3]):[0-5]\d)$/

/** Years taken; what lies outside comes from a clock that was never set. */
export const SAMPLING_YEARS = { first: 2000, last: 2099 } as const

/** Says what is wrong with a sampling time; undefined where nothing is. */
export function faultOfSamplingTime(text: string): string | undefined {
  if (!SAMPLING_TIME_PATTERN.test(text)) {
    return /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d+)?)?$/.test(text)
      ? 'The time has no offset, so that nobody can tell which moment it was.'
      : 'This is not an RFC 3339 time with seconds and an offset.'
  }
  const year = Number(text.slice(0, 4))
  const month = Number(text.slice(5, 7))
  const day = Number(text.slice(8, 10))
  if (day > daysOfMonth(year, month)) return `There is no ${text.slice(0, 10)} in the calendar.`
  if (year < SAMPLING_YEARS.first || year > SAMPLING_YEARS.last) {
    return `The year is outside ${SAMPLING_YEARS.first} to ${SAMPLING_YEARS.last}.`
  }
  return undefined
}

/** Days of a month of the Gregorian calendar, `month` from 1. */
function daysOfMonth(year: number, month: number): number {
  if (month === 2) return (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0 ? 29 : 28
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31
}

/** The same moment in UTC, without trailing zeros of the fraction: two spellings of one moment become equal. */
export function momentOf(text: string): string {
  const fraction = /\.(\d+)/.exec(text)?.[1]?.replace(/0+$/, '') ?? ''
  const seconds = new Date(text).toISOString().slice(0, 19)
  return fraction === '' ? `${seconds}Z` : `${seconds}.${fraction}Z`
}
