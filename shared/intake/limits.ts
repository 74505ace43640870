/** Every bound of intake, in one place: checked by the decoders and the door, and published with the contract. */
export const INTAKE_LIMITS = {
  /** Bytes of an `application/json` body, after inflation. */
  jsonBodyBytes: 8 * 1024 * 1024,
  /** Bytes of an NDJSON or CSV body as sent. */
  streamBodyBytes: 128 * 1024 * 1024,
  /** Bytes of any body after inflation. */
  inflatedBytes: 512 * 1024 * 1024,
  /** Readings in one `application/json` body. */
  jsonReadings: 5_000,
  /** Records in one NDJSON or CSV body. */
  streamRecords: 200_000,
  /** Bytes of one line; also characters of one CSV record with the line breaks inside its quotes. */
  lineBytes: 1024 * 1024,
  /** Characters (UTF-16 code units) of one CSV field. */
  fieldCharacters: 64 * 1024,
  /** Columns of a CSV header. */
  csvColumns: 200,
  /** Objects and lists inside one another, in one record. */
  jsonDepth: 32,
} as const

export type IntakeLimits = { readonly [Name in keyof typeof INTAKE_LIMITS]: number }

/** How much of a refused value is told back. */
export const REFUSED_VALUE_LENGTH = 200

/** A sampling time further ahead of the server than this is taken and flagged. */
export const AHEAD_MINUTES = 10

/** A sampling time further back than this is taken and flagged. */
export const LATE_DAYS = 30
