/**
 * What is checked beyond the published JSON Schema, because JSON Schema can't express it. A document
 * that JSON Schema accepts is refused only for one of these; one that it refuses is always refused.
 */
export const REFINEMENTS = [
  { pointer: '/sampledAt', code: 'time', text: 'The day exists in the calendar, and the year is 2000 to 2099.' },
  { pointer: '/subject', code: 'subject', text: 'A vehicle has at least one of vin, plate and workOrder.' },
  { pointer: '/composition/parts', code: 'duplicate-substance', text: 'Each substance stands once.' },
  { pointer: '/composition/parts', code: 'nothing-found', text: 'At least one part is above 0 and not below detection.' },
  { pointer: '/composition', code: 'sum', text: 'The percentages add up to 100. What is off by more than rounding explains (half the resolution for each number counted) is taken and flagged; what is off by far more is refused.' },
  { pointer: '/composition/airQualifier', code: 'missing', text: 'airQualifier needs airPercent.' },
  { pointer: '/conditions', code: 'pressure', text: 'pressureKilopascal and pressureKind stand together.' },
  { pointer: '/conditions/pressureKilopascal', code: 'range', text: 'An absolute pressure is not below 0.' },
  { pointer: 'every text', code: 'bad-character', text: 'No NUL, and no half of a surrogate pair.' },
  { pointer: 'every text', code: 'length', text: 'Lengths are counted in UTF-16 code units, of which some characters take two.' },
] as const
