import { createHash, randomUUID, type Hash } from 'node:crypto'
import { createReadStream } from 'node:fs'
import { open, unlink, type FileHandle } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** Pieces of this size go into the database; neither side holds a whole large file. */
export const CHUNK_BYTES = 1024 * 1024
/** Up to here a delivery stays in memory; beyond, it goes to a temporary file. */
const MEMORY_BYTES = 2 * CHUNK_BYTES

/** The bytes of one delivery while they come in: counted, hashed, and kept in memory or in a temporary file. */
export class Spool {
  byteLength = 0
  private hash: Hash = createHash('sha256')
  private parts: Buffer[] = []
  private file: FileHandle | null = null
  private path = ''

  async write(bytes: Buffer): Promise<void> {
    this.byteLength += bytes.length
    this.hash.update(bytes)
    if (!this.file && this.byteLength > MEMORY_BYTES) {
      this.path = join(tmpdir(), `coldslip-${randomUUID()}`)
      this.file = await open(this.path, 'wx+', 0o600)
      for (const part of this.parts) await this.file.write(part)
      this.parts = []
    }
    if (this.file) await this.file.write(bytes)
    else this.parts.push(bytes)
  }

  digest(): Buffer {
    return this.hash.digest()
  }

  /** The whole, where it is small enough to be in memory; null where it went to a file. */
  whole(): Buffer | null {
    if (this.file) return null
    if (this.parts.length !== 1) this.parts = [Buffer.concat(this.parts)]
    return this.parts[0]!
  }

  /** The bytes again, in pieces of {@link CHUNK_BYTES}. */
  async* chunks(): AsyncGenerator<Buffer> {
    if (this.file) {
      yield* createReadStream(this.path, { highWaterMark: CHUNK_BYTES }) as AsyncIterable<Buffer>
      return
    }
    const whole = this.whole()!
    for (let at = 0; at < whole.length; at += CHUNK_BYTES) yield whole.subarray(at, at + CHUNK_BYTES)
  }

  async dispose(): Promise<void> {
    this.parts = []
    const file = this.file
    this.file = null
    if (file) {
      await file.close()
      await unlink(this.path)
    }
  }
}
