export type IntakeFormat = 'json' | 'ndjson' | 'csv'

/** Media types that a submission may have, and how each is read. */
export const INTAKE_MEDIA_TYPES = {
  'application/json': 'json',
  'application/x-ndjson': 'ndjson',
  'application/ndjson': 'ndjson',
  'application/jsonl': 'ndjson',
  'text/csv': 'csv',
  'text/tab-separated-values': 'csv',
} as const satisfies Record<string, IntakeFormat>

/** Content encodings that a body may have. */
export const INTAKE_CONTENT_ENCODINGS = ['identity', 'gzip'] as const

/** The format that a Content-Type names, whatever its parameters; undefined where it isn't read. */
export function formatOf(contentType: string): IntakeFormat | undefined {
  const essence = contentType.split(';', 1)[0]!.trim().toLowerCase()
  return Object.hasOwn(INTAKE_MEDIA_TYPES, essence) ? INTAKE_MEDIA_TYPES[essence as keyof typeof INTAKE_MEDIA_TYPES] : undefined
}
