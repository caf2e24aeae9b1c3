/** The values of a PDF file as pdfkit writes them; strict, and bounded in depth and number whatever the bytes are. */

/** Why the bytes are not read, as the end of a sentence. */
export class PdfFault extends Error {
  constructor(why: string) {
    super(why)
    this.name = 'PdfFault'
  }
}

export type PdfValue = null | boolean | number | PdfName | PdfText | PdfReference | readonly PdfValue[] | PdfDictionary
export type PdfDictionary = ReadonlyMap<string, PdfValue>
export interface PdfName {
  readonly name: string
}
/** A byte a character. */
export interface PdfText {
  readonly text: string
}
export interface PdfReference {
  readonly object: number
}

const MAX_DEPTH = 32
/** Of one object. The largest of ours lists the elements of a page or the attachments: a few thousand values. */
const MAX_VALUES = 500_000
const MAX_TOKEN = 4096

const LINE_BREAK = 10
const isSpace = (byte: number): boolean => byte === 32 || byte === LINE_BREAK
const DELIMITERS = new Set([...'()<>[]/%'].map((mark) => mark.charCodeAt(0)))
const ESCAPES: Readonly<Record<string, string>> = { n: '\n', r: '\r', t: '\t', b: '\b', f: '\f', '(': '(', ')': ')', '\\': '\\' } // prettier-ignore
const NUMBER = /^-?\d{1,20}(?:\.\d{1,20})?$/
const OBJECT_NUMBER = /^\d{1,10}$/

export class PdfReader {
  at: number
  private values = 0

  constructor(
    private readonly bytes: Uint8Array,
    from: number,
    private readonly end = bytes.length,
  ) {
    this.at = from
  }

  /** @throws PdfFault unless exactly these characters come next */
  expect(words: string): void {
    if (!this.startsWith(words)) throw new PdfFault('its structure is damaged')
    this.at += words.length
  }

  startsWith(words: string): boolean {
    if (this.at + words.length > this.end) return false
    for (let k = 0; k < words.length; k++) if (this.bytes[this.at + k] !== words.charCodeAt(k)) return false
    return true
  }

  /** Digits alone, at most 15 of them. */
  wholeNumber(): number {
    let value = 0
    const from = this.at
    for (; this.at < this.end && this.at - from <= 15; this.at++) {
      const digit = this.bytes[this.at] - 48
      if (!(digit >= 0 && digit <= 9)) break
      value = value * 10 + digit
    }
    if (this.at === from || this.at - from > 15) throw new PdfFault('its structure is damaged')
    return value
  }

  value(depth = 0): PdfValue {
    if (depth > MAX_DEPTH || ++this.values > MAX_VALUES)
      throw new PdfFault('its structure is nested too deep or too long')
    this.skipSpace()
    if (this.startsWith('<<')) return this.dictionary(depth)
    const mark = String.fromCharCode(this.bytes[this.at] ?? 0)
    if (mark === '[') return this.array(depth)
    if (mark === '(') return this.text()
    if (mark === '<') return this.hexText()
    if (mark === '/') return { name: this.name() }
    return this.word()
  }

  private dictionary(depth: number): PdfDictionary {
    const entries = new Map<string, PdfValue>()
    this.expect('<<')
    for (this.skipSpace(); !this.startsWith('>>'); this.skipSpace()) {
      const key = this.name()
      if (entries.has(key)) throw new PdfFault(`its key ${key} stands twice`)
      entries.set(key, this.value(depth + 1))
    }
    this.expect('>>')
    return entries
  }

  private array(depth: number): readonly PdfValue[] {
    const entries: PdfValue[] = []
    this.expect('[')
    for (this.skipSpace(); !this.startsWith(']'); this.skipSpace()) entries.push(this.value(depth + 1))
    this.expect(']')
    return entries
  }

  private name(): string {
    this.expect('/')
    return this.token()
  }

  private token(): string {
    const from = this.at
    while (this.at < this.end && !isSpace(this.bytes[this.at]) && !DELIMITERS.has(this.bytes[this.at])) this.at++
    if (this.at === from || this.at - from > MAX_TOKEN) throw new PdfFault('its structure is damaged')
    return latin1(this.bytes.subarray(from, this.at))
  }

  /** A number, a reference to an object, or one of the words with a meaning. */
  private word(): PdfValue {
    const token = this.token()
    if (token === 'null') return null
    if (token === 'true' || token === 'false') return token === 'true'
    if (!NUMBER.test(token)) throw new PdfFault('its structure is damaged')
    if (OBJECT_NUMBER.test(token) && this.startsWith(' 0 R')) {
      this.at += 4
      return { object: Number(token) }
    }
    return Number(token)
  }

  private text(): PdfText {
    const parts: string[] = []
    this.expect('(')
    for (; this.at < this.end; this.at++) {
      const mark = String.fromCharCode(this.bytes[this.at])
      if (mark === ')') {
        this.at++
        return { text: parts.join('') }
      }
      if (mark === '(') break
      if (mark !== '\\') parts.push(mark)
      else {
        const escaped = ESCAPES[String.fromCharCode(this.bytes[++this.at] ?? 0)]
        if (escaped === undefined) break
        parts.push(escaped)
      }
    }
    throw new PdfFault('a text in it is damaged')
  }

  private hexText(): PdfText {
    this.expect('<')
    const digits = this.token()
    this.expect('>')
    if (digits.length % 2 !== 0 || !/^[0-9a-f]+$/i.test(digits)) throw new PdfFault('a text in it is damaged')
    return { text: latin1(Buffer.from(digits, 'hex')) }
  }

  private skipSpace(): void {
    while (this.at < this.end && isSpace(this.bytes[this.at])) this.at++
  }
}

function latin1(bytes: Uint8Array): string {
  return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).toString('latin1')
}

/** @throws PdfFault if the value is no dictionary */
export function dictionary(value: PdfValue | undefined): PdfDictionary {
  if (!(value instanceof Map)) throw new PdfFault('its structure is damaged')
  return value as PdfDictionary
}

/** @throws PdfFault if the value is no array */
export function array(value: PdfValue | undefined): readonly PdfValue[] {
  if (!Array.isArray(value)) throw new PdfFault('its structure is damaged')
  return value as readonly PdfValue[]
}

export function isReference(value: PdfValue | undefined): value is PdfReference {
  return typeof value === 'object' && value !== null && 'object' in value
}

/** The number of the object referred to. @throws PdfFault if the value is no reference */
export function reference(value: PdfValue | undefined): number {
  if (!isReference(value)) throw new PdfFault('its structure is damaged')
  return value.object
}

export function nameOf(value: PdfValue | undefined): string | null {
  return typeof value === 'object' && value !== null && 'name' in value ? value.name : null
}

export function textOf(value: PdfValue | undefined): string | null {
  return typeof value === 'object' && value !== null && 'text' in value ? value.text : null
}
