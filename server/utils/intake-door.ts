import { createGunzip } from 'node:zlib'
import type { H3Event } from 'h3'
import { decodeJson } from '#shared/intake/json'
import { INTAKE_LIMITS } from '#shared/intake/limits'
import { IntakeRefused } from '../services/ingest/ingest.errors'
import { Spool } from '../services/ingest/spool'

const MEDIA_TYPES: Record<string, 'application/json' | 'application/x-ndjson' | 'text/csv'> = {
  'application/json': 'application/json',
  'application/x-ndjson': 'application/x-ndjson',
  'application/ndjson': 'application/x-ndjson',
  'application/jsonl': 'application/x-ndjson',
  'text/csv': 'text/csv',
  'text/tab-separated-values': 'text/csv',
}

/** Bytes that inflate this much more than their size, beyond the first megabytes, are no table of readings. */
const MOST_INFLATION = 200
const RATIO_FROM_BYTES = 32 * 1024 * 1024
/** A sender slower than this for this long is cut off; no database connection is held meanwhile. */
const STALL_SECONDS = 30

export interface Body {
  spool: Spool
  mediaType: 'application/json' | 'application/x-ndjson' | 'text/csv'
  contentEncoding: 'gzip' | null
}

export function mediaTypeOf(event: H3Event): Body['mediaType'] {
  const given = (getHeader(event, 'content-type') ?? '').split(';')[0]!.trim().toLowerCase()
  const mediaType = MEDIA_TYPES[given]
  if (!mediaType) {
    throw new IntakeRefused(415, 'media-type', `${given ? `"${given.slice(0, 80)}" is not read here` : 'The content type is missing'}. Send application/json, application/x-ndjson or text/csv.`,
      { headers: { accept: 'application/json, application/x-ndjson, text/csv' } })
  }
  return mediaType
}

function encodingOf(event: H3Event): 'gzip' | null {
  const given = (getHeader(event, 'content-encoding') ?? '').trim().toLowerCase()
  if (given === '' || given === 'identity') return null
  if (given === 'gzip' || given === 'x-gzip') return 'gzip'
  throw new IntakeRefused(415, 'content-encoding', 'Send the body as it is or compressed with gzip.', { headers: { 'accept-encoding': 'gzip, identity' } })
}

/**
 * Takes a body in: counted against its bounds while it streams, hashed, never more in memory than a
 * few megabytes. JSON is read through at the door, so that a sender learns of a slip at once.
 *
 * @throws IntakeRefused; what had come in is thrown away.
 */
export async function readIntakeBody(event: H3Event): Promise<Body> {
  const mediaType = mediaTypeOf(event)
  const contentEncoding = encodingOf(event)
  const most = mediaType === 'application/json' && !contentEncoding ? INTAKE_LIMITS.jsonBodyBytes : INTAKE_LIMITS.streamBodyBytes
  const tooLarge = () => new IntakeRefused(413, 'too-large', `The body is larger than ${most} bytes. Split it into several.`, { headers: { connection: 'close' } })
  const declared = Number(getHeader(event, 'content-length') ?? 0)
  if (declared > most) throw tooLarge()

  const spool = new Spool()
  const inflated = contentEncoding ? new InflatedCounter(mediaType === 'application/json' ? INTAKE_LIMITS.jsonBodyBytes : INTAKE_LIMITS.inflatedBytes) : null
  const request = event.node.req
  const stalled = setTimeout(() => request.destroy(), STALL_SECONDS * 1000)
  try {
    for await (const part of request as AsyncIterable<Buffer>) {
      stalled.refresh()
      if (spool.byteLength + part.length > most) throw tooLarge()
      await spool.write(part)
      await inflated?.write(part)
    }
    await inflated?.end()
    if (!request.complete) throw new IntakeRefused(400, 'cut', 'The body ended before its announced length.')
    if (spool.byteLength === 0) throw new IntakeRefused(400, 'empty', 'The body is empty.')
    if (mediaType === 'application/json') checkJson(inflated ? inflated.bytes() : spool.whole() ?? await wholeOf(spool))
    return { spool, mediaType, contentEncoding }
  } catch (error) {
    await spool.dispose()
    // The sender went away in the middle: its socket's error must not pass for one of the database.
    throw error instanceof IntakeRefused || !request.destroyed || request.complete ? error : new IntakeRefused(400, 'cut', 'The body ended before its announced length.')
  } finally {
    clearTimeout(stalled)
  }
}

async function wholeOf(spool: Spool): Promise<Buffer> {
  const parts: Buffer[] = []
  for await (const part of spool.chunks()) parts.push(part)
  return Buffer.concat(parts)
}

/** Syntax, the count and an empty list are told at the door; single readings are judged by the worker. */
function checkJson(bytes: Uint8Array): void {
  const decoded = decodeJson(bytes, { maxReadings: INTAKE_LIMITS.jsonReadings })
  if (decoded.kind === 'records') return
  const { code, reason, mend, place } = decoded.failure
  throw new IntakeRefused(code === 'too-many-readings' ? 413 : 400, code, `${reason}${place ? ` At ${place}.` : ''} ${mend}`, { errors: [{ code, place, detail: reason }] })
}

/** Inflates alongside to know the real size before anything is stored; keeps the bytes only of a JSON body. */
class InflatedCounter {
  private gunzip = createGunzip()
  private length = 0
  private sent = 0
  private parts: Buffer[] = []
  private failure: IntakeRefused | null = null
  private ended: Promise<void>

  constructor(private most: number) {
    this.ended = new Promise((resolve) => {
      this.gunzip.on('data', (part: Buffer) => {
        this.length += part.length
        if (this.length > this.most || (this.length > RATIO_FROM_BYTES && this.length > this.sent * MOST_INFLATION)) {
          this.failure ??= new IntakeRefused(413, 'inflated-too-large', 'The body is too large once inflated. Split it into several.', { headers: { connection: 'close' } })
          this.gunzip.destroy()
        } else if (this.most <= INTAKE_LIMITS.jsonBodyBytes) this.parts.push(part)
      })
      this.gunzip.on('error', () => {
        this.failure ??= new IntakeRefused(400, 'gzip', 'The body is not complete gzip data.')
      })
      this.gunzip.on('close', resolve)
    })
  }

  async write(bytes: Buffer): Promise<void> {
    this.sent += bytes.length
    if (!this.gunzip.destroyed && !this.gunzip.write(bytes)) {
      await Promise.race([new Promise(resolve => this.gunzip.once('drain', resolve)), this.ended])
    }
    if (this.failure) throw this.failure
  }

  async end(): Promise<void> {
    this.gunzip.end()
    await this.ended
    if (this.failure) throw this.failure
  }

  bytes(): Buffer {
    return Buffer.concat(this.parts)
  }
}
