import PDFDocument from 'pdfkit'
import { FALLBACKS, type Face, type FontName } from './fonts'

/** Inks of paper; all but `soft` and `line` are told apart by shape as well. */
export const INK = '#0F1C24'
export const SOFT = '#4A5C66'
export const LINE = '#7B8D96'
export const WHITE = '#FFFFFF'

export interface TextStyle { face?: Face, size?: number, color?: string }
export interface Span extends TextStyle { text: string }
type Text = string | Span[]

interface Piece { text: string, font: FontName, size: number, color: string, width: number }
interface Line { pieces: Piece[], width: number, size: number }

export interface PaperOptions {
  format: 'a4' | 'letter'
  fonts: Record<FontName, Buffer>
  title: string
  author: string
  /** Stands as the document's date and goes into its id, so that the same certificate is the same file. */
  date: Date
}

const MARGIN = 42
const FOOT = 26

/** Millimetres and points stay out of the drawings: `left`, `width` and a falling `y`, in points. */
export class Paper {
  readonly doc: PDFKit.PDFDocument
  readonly left = MARGIN
  readonly width: number
  y = MARGIN
  private readonly bottom: number
  private readonly fontOfSign = new Map<string, FontName>()

  constructor({ format, fonts, title, author, date }: PaperOptions) {
    this.doc = new PDFDocument({
      size: format === 'a4' ? 'A4' : 'LETTER', margin: 0, autoFirstPage: true, bufferPages: true, lang: 'en', displayTitle: true, pdfVersion: '1.7',
      info: { Title: title, Author: author, Creator: 'Coldslip', Producer: 'Coldslip', CreationDate: date, ModDate: date },
    })
    for (const [name, bytes] of Object.entries(fonts)) this.doc.registerFont(name, bytes)
    this.width = this.doc.page.width - 2 * MARGIN
    this.bottom = this.doc.page.height - MARGIN - FOOT
  }

  /** What a whole page has room for. */
  get pageHeight(): number {
    return this.bottom - MARGIN
  }

  /** Goes on to the next page where less than `height` is left on this one. */
  ensure(height: number): void {
    if (this.y + height <= this.bottom) return
    this.nextPage()
  }

  nextPage(): void {
    this.doc.addPage()
    this.y = MARGIN
  }

  /** Writes at a place and wraps; @returns the height that it took. */
  write(text: Text, { x = this.left, y = this.y, width = this.width, align = 'left', ...style }: TextStyle & { x?: number, y?: number, width?: number, align?: 'left' | 'right' | 'center' } = {}): number {
    let at = y
    for (const line of this.wrap(text, style, width)) {
      const start = align === 'left' ? x : align === 'right' ? x + width - line.width : x + (width - line.width) / 2
      this.drawLine(line, start, at)
      at += line.size * LEADING
    }
    return at - y
  }

  /** The height that `write` would take. */
  heightOf(text: Text, { width = this.width, ...style }: TextStyle & { width?: number } = {}): number {
    return this.wrap(text, style, width).reduce((sum, line) => sum + line.size * LEADING, 0)
  }

  widthOf(text: string, style: TextStyle = {}): number {
    return this.pieces({ text, ...style }).reduce((sum, piece) => sum + piece.width, 0)
  }

  rule(color = LINE, weight = 0.5): void {
    this.doc.save().moveTo(this.left, this.y).lineTo(this.left + this.width, this.y).lineWidth(weight).stroke(color).restore()
  }

  /** Ends the document. */
  async finish(): Promise<Buffer> {
    const parts: Buffer[] = []
    const done = new Promise<void>((resolve, reject) => {
      this.doc.on('data', (part: Buffer) => parts.push(part))
      this.doc.once('end', resolve)
      this.doc.once('error', reject)
    })
    this.doc.end()
    await done
    return Buffer.concat(parts)
  }

  private drawLine(line: Line, x: number, y: number): void {
    let at = x
    const baseline = y + line.size * 0.98
    for (const piece of line.pieces) {
      this.doc.font(piece.font).fontSize(piece.size).fillColor(piece.color).text(piece.text, at, baseline, { lineBreak: false, baseline: 'alphabetic' })
      at += piece.width
    }
  }

  private wrap(text: Text, style: TextStyle, width: number): Line[] {
    const spans = typeof text === 'string' ? [{ text }] : text
    const lines: Line[] = []
    let line: Line = { pieces: [], width: 0, size: 0 }
    const end = () => {
      while (line.pieces.at(-1)?.text === ' ') line.width -= line.pieces.pop()!.width
      lines.push(line)
      line = { pieces: [], width: 0, size: 0 }
    }
    for (const span of spans) {
      for (const word of span.text.match(/ |[^ ]+/g) ?? []) {
        let pieces = this.pieces({ ...style, ...span, text: word })
        let wordWidth = pieces.reduce((sum, piece) => sum + piece.width, 0)
        if (line.width > 0 && word !== ' ' && line.width + wordWidth > width) end()
        // A word longer than the line (a digest, say) is cut where it must be.
        while (wordWidth > width) {
          const whole = pieces.map(piece => piece.text).join('')
          const fits = Math.max(1, Math.floor(whole.length * width / wordWidth))
          for (const piece of this.pieces({ ...style, ...span, text: whole.slice(0, fits) })) add(line, piece)
          end()
          pieces = this.pieces({ ...style, ...span, text: whole.slice(fits) })
          wordWidth = pieces.reduce((sum, piece) => sum + piece.width, 0)
        }
        if (word === ' ' && line.pieces.length === 0 && lines.length > 0) continue
        for (const piece of pieces) add(line, piece)
      }
    }
    if (line.pieces.length > 0 || lines.length === 0) end()
    return lines
  }

  private pieces({ text, face = 'sans', size = 9, color = INK }: Span): Piece[] {
    const pieces: Piece[] = []
    for (const sign of text) {
      const font = this.fontFor(sign, face)
      const last = pieces.at(-1)
      if (last?.font === font) last.text += sign
      else pieces.push({ text: sign, font, size, color, width: 0 })
    }
    for (const piece of pieces) piece.width = this.doc.font(piece.font).fontSize(size).widthOfString(piece.text)
    return pieces
  }

  private fontFor(sign: string, face: Face): FontName {
    const key = face + sign
    let font = this.fontOfSign.get(key)
    if (!font) {
      font = FALLBACKS[face].find(name => this.has(name, sign)) ?? FALLBACKS[face][0]!
      this.fontOfSign.set(key, font)
    }
    return font
  }

  private has(name: FontName, sign: string): boolean {
    // The types leave out the font that the library keeps open.
    const { _font } = this.doc.font(name) as unknown as { _font: { font: { hasGlyphForCodePoint: (code: number) => boolean } } }
    return _font.font.hasGlyphForCodePoint(sign.codePointAt(0)!)
  }
}

const LEADING = 1.32

function add(line: Line, piece: Piece): void {
  line.pieces.push(piece)
  line.width += piece.width
  line.size = Math.max(line.size, piece.size)
}
