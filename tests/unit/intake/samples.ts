import { checkRecord } from '#shared/intake/check-record'
import { INTAKE_LIMITS, type IntakeLimits } from '#shared/intake/limits'
import type { RawRecord } from '#shared/intake/raw-record'
import type { PurityReading } from '#shared/intake/reading-schema'
import type { DecodeFailure, Refusal } from '#shared/intake/refusal'
import { decodeSubmission, type DecodeReport } from '#server/services/ingest/decode'

/** A good reading; `change` may do anything to it. */
export function reading(change: (reading: any) => void = () => {}): any {
  const value = {
    schema: 'purity-reading/1',
    id: 't-1',
    sampledAt: '2026-03-14T09:26:53-05:00',
    instrument: { serial: 'BT-1', sequence: 1 },
    subject: { kind: 'vehicle', plate: 'TST 001' },
    declared: 'R-134a',
    composition: {
      basis: 'mass',
      air: 'apart',
      resolution: 0.1,
      parts: [{ substance: 'R-134a', percent: 99.4 }, { substance: 'HC', percent: 0.6 }],
      airPercent: 2,
    },
  }
  change(value)
  return value
}

export const readingText = JSON.stringify(reading())

export const csvHeader = 'id,sampled_at,instrument_serial,subject_kind,plate,declared,basis,air,resolution,r134a_pct,hc_pct,air_pct,note'
export const csvRow = 't-1,2026-03-14T09:26:53-05:00,BT-1,vehicle,TST 001,R-134a,mass,apart,0.1,99.4,0.6,2.0,'

/** A good row with cells of its own, by column. */
export function csvRowWith(cells: Record<string, string>): string {
  const names = csvHeader.split(',')
  return csvRow.split(',').map((cell, index) => cells[names[index]!] ?? cell).join(',')
}

export interface Decoded {
  records: RawRecord[]
  /** Of each record: the reading, or its refusals. */
  outcomes: ({ reading: PurityReading, extras: Record<string, string> | undefined } | { line: number | null, refusals: Refusal[] })[]
  readings: PurityReading[]
  refusals: Refusal[]
  failure: DecodeFailure | undefined
  report: DecodeReport | undefined
  batches: number[]
}

export interface DecodeWish {
  mediaType?: string
  contentEncoding?: string | null
  limits?: Partial<IntakeLimits>
  /** Sizes of the chunks, used in turn. */
  chunks?: readonly number[]
}

/** Sends bytes through the whole of decoding and checking, as the worker does. */
export async function decode(body: string | Uint8Array, wish: DecodeWish = {}): Promise<Decoded> {
  const bytes = typeof body === 'string' ? new TextEncoder().encode(body) : body
  const decoded: Decoded = { records: [], outcomes: [], readings: [], refusals: [], failure: undefined, report: undefined, batches: [] }
  const events = decodeSubmission({
    mediaType: wish.mediaType ?? 'text/csv',
    contentEncoding: wish.contentEncoding ?? null,
    chunks: chunked(bytes, wish.chunks ?? [64 * 1024]),
  }, { ...INTAKE_LIMITS, ...wish.limits })
  for await (const event of events) {
    if ('failure' in event) decoded.failure = event.failure
    else if ('report' in event) decoded.report = event.report
    else {
      decoded.batches.push(event.records.length)
      for (const record of event.records) take(decoded, record)
    }
  }
  return decoded
}

function take(decoded: Decoded, record: RawRecord): void {
  decoded.records.push(record)
  const check = checkRecord(record)
  if (check.ok) {
    decoded.readings.push(check.reading)
    decoded.outcomes.push({ reading: check.reading, extras: record.extras })
  } else {
    decoded.refusals.push(...check.refusals)
    decoded.outcomes.push({ line: record.line, refusals: check.refusals })
  }
}

async function* chunked(bytes: Uint8Array, sizes: readonly number[]): AsyncGenerator<Uint8Array> {
  let at = 0
  for (let index = 0; at < bytes.length; index++) {
    const size = sizes[index % sizes.length]!
    yield bytes.subarray(at, at + size)
    at += size
  }
}
