import { parse } from 'csv-parse/sync'
import type { SplitCsvFields } from '#shared/intake/csv-header'

/**
 * Splits whole CSV records into fields. The records come one by one, with their quotes already
 * followed, so that a fault in one can't reach the next and line breaks inside quotes stay as they are.
 */
export const splitCsvFields: SplitCsvFields = (records, delimiter) => {
  if (records.length === 0) return []
  return parse(records.join('\n'), { delimiter, record_delimiter: ['\n'], relax_column_count: true, skip_empty_lines: false })
}
