/** One line of a stream, without its ending. */
export interface ByteLine {
  /** From 1. */
  line: number
  /** Of a line that is too long: its beginning, as much as the bound allows. */
  bytes: Uint8Array
  ending: '\n' | '\r\n' | '\r' | ''
  tooLong: boolean
}

export interface LineSplitterOptions {
  /** Most bytes of a line; what is beyond is dropped as it comes, so that memory stays flat. */
  mostBytes: number
  /** Whether CR alone ends a line, as it may in CSV. CR LF always is one ending. */
  carriageReturnEnds: boolean
}

const LF = 0x0A
const CR = 0x0D
const NOTHING = new Uint8Array(0)

/**
 * Cuts bytes into lines, however they are chunked. Fits every encoding in which CR and LF are bytes of
 * their own (UTF-8, Windows-1252). The lines handed out may share memory with the chunk.
 */
export class LineSplitter {
  /** Empty lines are counted, but handed out only while this is set. */
  keepEmpty = false
  private line = 1
  private pieces: Uint8Array[] = []
  private length = 0
  private tooLong = false
  /** The last chunk ended in a CR that may be half of CR LF. */
  private heldReturn = false

  constructor(private readonly options: LineSplitterOptions) {}

  /** Calls `emit` for each line that the chunk completes, before looking further. */
  push(chunk: Uint8Array, emit: (line: ByteLine) => void): void {
    const { carriageReturnEnds } = this.options
    let begin = 0
    if (this.heldReturn && chunk.length > 0) {
      this.heldReturn = false
      if (chunk[0] === LF) {
        this.finish('\r\n', emit)
        begin = 1
      } else if (carriageReturnEnds) this.finish('\r', emit)
      else this.keep(CARRIAGE_RETURN)
    }
    for (let at = begin; at < chunk.length; at++) {
      const byte = chunk[at]!
      if (byte !== LF && byte !== CR) continue
      if (byte === LF) {
        this.keep(chunk.subarray(begin, at))
        this.finish('\n', emit)
      } else if (at + 1 === chunk.length) {
        this.keep(chunk.subarray(begin, at))
        this.heldReturn = true
      } else if (chunk[at + 1] === LF) {
        this.keep(chunk.subarray(begin, at))
        this.finish('\r\n', emit)
        at++
      } else if (carriageReturnEnds) {
        this.keep(chunk.subarray(begin, at))
        this.finish('\r', emit)
      } else continue
      begin = at + 1
    }
    this.keep(chunk.subarray(begin))
  }

  /** Hands out the last line, where it has no ending of its own. */
  end(emit: (line: ByteLine) => void): void {
    if (this.heldReturn) {
      this.heldReturn = false
      this.finish('\r', emit)
    } else if (this.length > 0) this.finish('', emit)
  }

  private keep(piece: Uint8Array): void {
    if (piece.length === 0) return
    const room = this.options.mostBytes - this.length
    if (piece.length > room) {
      this.tooLong = true
      if (room <= 0) return
      piece = piece.subarray(0, room)
    }
    this.pieces.push(piece)
    this.length += piece.length
  }

  private finish(ending: ByteLine['ending'], emit: (line: ByteLine) => void): void {
    const { line, tooLong, length } = this
    const bytes = this.pieces.length === 1 ? this.pieces[0]! : length === 0 ? NOTHING : joinBytes(this.pieces, length)
    this.line++
    this.pieces = []
    this.length = 0
    this.tooLong = false
    if (length > 0 || this.keepEmpty) emit({ line, bytes, ending, tooLong })
  }
}

const CARRIAGE_RETURN = Uint8Array.of(CR)

export function joinBytes(pieces: readonly Uint8Array[], length: number): Uint8Array {
  const joined = new Uint8Array(length)
  let at = 0
  for (const piece of pieces) {
    joined.set(piece, at)
    at += piece.length
  }
  return joined
}
