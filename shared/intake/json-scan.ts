import { escapePointerStep } from './json-pointer'
import { refuse, type Refusal } from './refusal'

/** The text is not JSON: where, as UTF-16 offset into the text, and why. */
export class JsonSyntaxFault extends Error {
  override name = 'JsonSyntaxFault'
  constructor(readonly offset: number, message: string) {
    super(message)
  }
}

/** The scan stopped because the list holds more records than allowed. */
export class TooManyElements extends Error {
  override name = 'TooManyElements'
}

/** One value found in a text, with its faults; their pointers are relative to the value. */
export interface ScannedValue {
  start: number
  /** Offset just after the value. */
  end: number
  refusals: Refusal[]
}

export interface ScannedText {
  root: ScannedValue
  /** Names of the root object's members, in order; empty where the root is no object. */
  rootMembers: string[]
  /** Elements of the root's list `listMember`, each with faults of its own; null where there is no such list. */
  elements: ScannedValue[] | null
}

export interface ScanOptions {
  /** Objects and lists inside one another, counted from the record. */
  depth: number
  /** Member of the root object whose list holds the records. */
  listMember?: string
  /** Most elements of that list. */
  mostElements?: number
}

/**
 * Checks a text against RFC 8259 and I-JSON (RFC 7493) without recursion, and finds where its records
 * stand, so that each can be given to `JSON.parse` and kept exactly as sent. `JSON.parse` alone would
 * keep the last of two equal members, round integers beyond 2^53, make 1e400 infinite, and take any depth.
 *
 * Equal members, numbers that a double can't hold, and too much depth are faults of the record that they
 * stand in; the scan goes on, so that its neighbours are read.
 * @throws JsonSyntaxFault at the first character that no JSON text can have there.
 * @throws TooManyElements
 */
export function scanJson(text: string, options: ScanOptions): ScannedText {
  return new Scanner(text, options).scan()
}

interface Frame {
  isObject: boolean
  /** The member that is being read. */
  name: string
  /** The element that is being read. */
  index: number
  /** Names seen so far; made with the second member, since most objects are told apart by it. */
  names: Set<string> | undefined
}

const MOST_FAULTS = 20
const NUMBER = /-?(?:0|[1-9]\d*)(\.\d+)?([eE][+-]?\d+)?/y
const WORD = /[A-Za-z]+/y
const ESCAPE = /\\(?:["\\/bfnrt]|u[0-9A-Fa-f]{4})/y

class Scanner {
  private at = 0
  private readonly stack: Frame[] = []
  private readonly root: ScannedValue = { start: 0, end: 0, refusals: [] }
  private readonly rootMembers: string[] = []
  private elements: ScannedValue[] | null = null
  /** The record that is being read: the root, or an element of the list. */
  private record: ScannedValue = this.root
  /** Frames outside the record that is being read: none, or the root and its list. */
  private recordDepth = 0

  constructor(private readonly text: string, private readonly options: ScanOptions) {}

  scan(): ScannedText {
    this.skipSpace()
    this.root.start = this.at
    do this.readValueStart()
    while (this.goOn())
    return { root: this.root, rootMembers: this.rootMembers, elements: this.elements }
  }

  /** Reads a scalar whole, and of an object or a list everything up to its first value. */
  private readValueStart(): void {
    for (;;) {
      this.enterElement()
      const code = this.text.charCodeAt(this.at)
      if (code === 0x22) return this.readString()
      if (code === 0x2D || (code >= 0x30 && code <= 0x39)) return this.readNumber()
      if (code !== 0x7B && code !== 0x5B) return this.readWord()
      if (this.open(code === 0x7B)) return
    }
  }

  /** Opens an object or a list; true where it was empty, and is closed again. */
  private open(isObject: boolean): boolean {
    const { stack, options } = this
    const depth = stack.length - this.recordDepth
    if (depth === options.depth) this.fault('too-deep', { reason: `Objects and lists are nested more than ${options.depth} deep.` })
    if (!isObject && stack.length === 1 && stack[0]!.isObject && stack[0]!.name === options.listMember) this.elements ??= []
    this.at++
    this.skipSpace()
    if (this.text.charCodeAt(this.at) === (isObject ? 0x7D : 0x5D)) {
      this.at++
      return true
    }
    stack.push({ isObject, name: '', index: 0, names: undefined })
    if (isObject) this.readName()
    return false
  }

  /** After a value: closes what closes here. False at the end of the text; true where another value begins. */
  private goOn(): boolean {
    const { stack, text } = this
    for (;;) {
      const frame = stack[stack.length - 1]
      if (this.recordDepth === 2 && stack.length === 2) this.leaveElement()
      if (frame === undefined) this.root.end = this.at
      this.skipSpace()
      const code = text.charCodeAt(this.at)
      if (frame === undefined) {
        if (this.at < text.length) throw new JsonSyntaxFault(this.at, `The text goes on after its end, with ${this.shown()}.`)
        return false
      }
      if (code === 0x2C) {
        this.at++
        this.skipSpace()
        if (frame.isObject) this.readName()
        else frame.index++
        return true
      }
      if (code !== (frame.isObject ? 0x7D : 0x5D)) {
        throw new JsonSyntaxFault(this.at, `Expected a comma or ${frame.isObject ? '}' : ']'}, found ${this.shown()}.`)
      }
      this.at++
      stack.pop()
    }
  }

  /** Where an element of the list of records begins, its faults are its own from here. */
  private enterElement(): void {
    const { stack, elements } = this
    if (elements === null || stack.length !== 2 || stack[1]!.isObject || stack[0]!.name !== this.options.listMember) return
    if (elements.length >= (this.options.mostElements ?? Number.POSITIVE_INFINITY)) throw new TooManyElements()
    this.record = { start: this.at, end: this.at, refusals: [] }
    this.recordDepth = 2
    elements.push(this.record)
  }

  private leaveElement(): void {
    this.record.end = this.at
    this.record = this.root
    this.recordDepth = 0
  }

  /** Reads a member's name and the colon behind it. */
  private readName(): void {
    const { text } = this
    const begin = this.at
    if (text.charCodeAt(begin) !== 0x22) throw new JsonSyntaxFault(begin, `Expected the name of a member in double quotes, found ${this.shown()}.`)
    this.readString()
    const inside = text.slice(begin + 1, this.at - 1)
    const name = inside.includes('\\') ? JSON.parse(text.slice(begin, this.at)) as string : inside
    const frame = this.stack[this.stack.length - 1]!
    if (frame.names === undefined) frame.names = new Set([name])
    else if (frame.names.has(name)) {
      frame.name = name
      this.fault('duplicate-member', { reason: `The member ${JSON.stringify(name.slice(0, 100))} stands twice in one object.` })
    } else frame.names.add(name)
    frame.name = name
    if (this.stack.length === 1) this.rootMembers.push(name)
    this.skipSpace()
    if (text.charCodeAt(this.at) !== 0x3A) throw new JsonSyntaxFault(this.at, `Expected a colon, found ${this.shown()}.`)
    this.at++
    this.skipSpace()
  }

  private readString(): void {
    const { text } = this
    let at = this.at + 1
    for (;;) {
      const code = text.charCodeAt(at)
      if (code === 0x22) break
      if (code === 0x5C) {
        ESCAPE.lastIndex = at
        if (!ESCAPE.test(text)) throw new JsonSyntaxFault(at, 'The text after the backslash is no escape of JSON.')
        at = ESCAPE.lastIndex
      } else if (code < 0x20) {
        throw new JsonSyntaxFault(at, 'A control character stands in a text; JSON wants it escaped.')
      } else if (at >= text.length) {
        throw new JsonSyntaxFault(text.length, 'The end comes inside a text.')
      } else at++
    }
    this.at = at + 1
  }

  private readNumber(): void {
    NUMBER.lastIndex = this.at
    const match = NUMBER.exec(this.text)
    if (match === null) throw new JsonSyntaxFault(this.at, 'A minus sign stands without a number.')
    const [source, fraction, exponent] = match
    const value = Number(source)
    const isInteger = fraction === undefined && exponent === undefined
    if (!Number.isFinite(value) || (isInteger && !Number.isSafeInteger(value))) {
      this.fault('range', { reason: 'The number is too large to be held exactly.', value: source })
    } else if (value === 0 && /[1-9]/.test(source.replace(/[eE].*/, ''))) {
      this.fault('range', { reason: 'The number is too small to be told from 0.', value: source })
    }
    this.at = NUMBER.lastIndex
  }

  private readWord(): void {
    WORD.lastIndex = this.at
    const word = WORD.exec(this.text)?.[0]
    if (word !== 'true' && word !== 'false' && word !== 'null') {
      throw new JsonSyntaxFault(this.at, `Expected a value, found ${word === undefined ? this.shown() : word.slice(0, 20)}.`)
    }
    this.at = WORD.lastIndex
  }

  private skipSpace(): void {
    const { text } = this
    for (;;) {
      const code = text.charCodeAt(this.at)
      if (code !== 0x20 && code !== 0x0A && code !== 0x0D && code !== 0x09) return
      this.at++
    }
  }

  private fault(code: 'too-deep' | 'duplicate-member' | 'range', detail: { reason: string, value?: string }): void {
    if (this.record.refusals.length < MOST_FAULTS) this.record.refusals.push(refuse(code, { ...detail, pointer: this.pointer() }))
  }

  /** Pointer to what is being read, within the record. */
  private pointer(): string {
    let pointer = ''
    for (let depth = this.recordDepth; depth < this.stack.length; depth++) {
      const frame = this.stack[depth]!
      pointer += `/${frame.isObject ? escapePointerStep(frame.name) : frame.index}`
    }
    return pointer
  }

  private shown(): string {
    if (this.at >= this.text.length) return 'the end of the text'
    return JSON.stringify(String.fromCodePoint(this.text.codePointAt(this.at)!))
  }
}
