/** How a cylinder was last tested; the next date depends on it. */
export type RequalificationMethod = 'proof pressure' | 'volumetric expansion' | 'external visual'

export interface Requalification {
  due: string
  /** Years from each later test to the next. */
  thenEveryYears: number
}

/** Years to the first test of a DOT 4B, 4BA or 4BW cylinder over 12 lb of water in clean refrigerant service, and between later ones: 49 CFR 180.209(e); the five years of the visual route, 180.209(g), from memory. */
const INTERVALS: Readonly<Record<RequalificationMethod, { first: number, then: number }>> = {
  'proof pressure': { first: 12, then: 7 },
  'volumetric expansion': { first: 12, then: 12 },
  'external visual': { first: 5, then: 5 },
}

/** A calendar day some years on; 29 February becomes the 28th where the year has none. Days as `YYYY-MM-DD`. @throws RangeError */
export function addYears(day: string, years: number): string {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day)
  if (!match) throw new RangeError(`"${day}" is no day`)
  const [year, month, date] = [Number(match[1]), Number(match[2]), Number(match[3])]
  if (month < 1 || month > 12 || date < 1 || date > daysIn(year, month)) throw new RangeError(`"${day}" is no day`)
  const later = year + years
  return `${String(later).padStart(4, '0')}-${match[2]}-${String(Math.min(date, daysIn(later, month))).padStart(2, '0')}`
}

/** Days of a month, 1 to 12. */
const daysIn = (year: number, month: number): number => new Date(Date.UTC(year, month, 0)).getUTCDate()

/** When a cylinder is due: from its original test for the first time, from the last test after that. */
export function requalificationDue({ testedOn, method, first }: { testedOn: string, method: RequalificationMethod, first: boolean }): Requalification {
  const interval = INTERVALS[method]
  return { due: addYears(testedOn, first ? interval.first : interval.then), thenEveryYears: interval.then }
}

/** DOT 39 cylinders, however it is written (DOT-39, DOT39), are for one trip: never refilled, never for recovered refrigerant (49 CFR 178.65, from memory). */
export function mayBeRefilled(specification: string): boolean {
  return !/(?<!\d)39(?!\d)/.test(specification)
}

/** Last day on which a record must still be kept. */
export function keepUntil({ recordedOn, years }: { recordedOn: string, years: number }): string {
  return addYears(recordedOn, years)
}
