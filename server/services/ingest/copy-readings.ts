import { once } from 'node:events'
import { finished } from 'node:stream/promises'
import type { BulkTransaction } from '../../database/tenancy'

/** Columns of `readings` in the order in which {@link copyReadings} takes values. */
export const READING_COLUMNS = [
  'organisation_id', 'sampled_at', 'id', 'shop_id', 'instrument_id', 'sequence', 'subject_kind', 'subject_id', 'work_order_id',
  'declared', 'verdict', 'decided_by', 'decided_by_substance', 'purity_percent', 'purity_uncertainty', 'air_percent',
  'contaminants', 'resolution', 'reported', 'composition', 'verdict_detail', 'limit_set_version', 'attempt', 'flags', 'batch',
  'operator', 'note', 'ambient_celsius', 'pressure_kilopascal', 'pressure_kind', 'port', 'extras', 'source', 'submission_id',
  'ordinal', 'line', 'sender', 'sender_reading_id', 'received_at', 'record_digest', 'audit_sequence',
] as const

export type CopyValue = string | number | null | Buffer | readonly string[]

const special = /[\\\t\n\r]/
const escapes: Record<string, string> = { '\\': '\\\\', '\t': '\\t', '\n': '\\n', '\r': '\\r' }

function escapeText(text: string): string {
  return special.test(text) ? text.replace(/[\\\t\n\r]/g, found => escapes[found]!) : text
}

/** One value in PostgreSQL's COPY text format. */
function copyText(value: CopyValue): string {
  if (value === null) return '\\N'
  if (typeof value === 'number') return String(value)
  if (typeof value === 'string') return escapeText(value)
  if (Buffer.isBuffer(value)) return `\\\\x${value.toString('hex')}`
  return escapeText(`{${value.map(item => `"${item.replace(/["\\]/g, '\\$&')}"`).join(',')}}`)
}

/**
 * Writes rows into `readings`. COPY can't go into a table with row-level security, so it goes into a
 * temporary table of the connection and from there, under the policy, into the partitions.
 */
export async function copyReadings(tx: BulkTransaction, rows: Iterable<readonly CopyValue[]>): Promise<void> {
  await tx`create temporary table if not exists incoming_readings (like readings including defaults) on commit delete rows`
  const stream = await tx`copy incoming_readings (${tx(READING_COLUMNS as unknown as string[])}) from stdin`.writable()
  let text = ''
  for (const row of rows) {
    for (let i = 0; i < row.length; i++) text += (i === 0 ? '' : '\t') + copyText(row[i]!)
    text += '\n'
    if (text.length > 256 * 1024) {
      if (!stream.write(text)) await once(stream, 'drain')
      text = ''
    }
  }
  stream.end(text)
  await finished(stream)
  await tx`insert into readings select * from incoming_readings`
}
