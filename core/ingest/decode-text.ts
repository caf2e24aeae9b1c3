/**
 * Bytes to text: UTF-8, UTF-16 either way, and Windows-1252 (which holds Latin-1) where the bytes are no valid UTF-8.
 * The text of a large file is made a piece at a time, so that it is never held whole beside its bytes.
 */
import { nonTextKind } from './text-signature'

export interface DecodedText {
  readonly encoding: string
  /**
   * The file's own units, bytes or those of UTF-16; every ASCII character is one. A file whose lines end in "\r" alone
   * has "\n" there instead; "\r\n" is left as it is.
   */
  readonly units: Uint8Array | Uint16Array
  /** The text of these units, which begin and end between characters; without them, of all. */
  readonly text: (begin?: number, end?: number) => string
}

export interface NoText {
  readonly looksLike: string
}

const NEWLINE = 10
const RETURN = 13

export function decodeText(bytes: Uint8Array): DecodedText | NoText {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return utf16(bytes.subarray(2), true, 'UTF-16 LE with mark')
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return utf16(bytes.subarray(2), false, 'UTF-16 BE with mark')
  const silent = silentUtf16(bytes)
  if (silent !== null) return utf16(bytes, silent, silent ? 'UTF-16 LE' : 'UTF-16 BE')
  const looksLike = nonTextKind(bytes)
  if (looksLike !== null) return { looksLike }
  const marked = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf
  const body = marked ? bytes.subarray(3) : bytes
  if (!isUtf8(body)) return decoded('Windows-1252', body, windows1252)
  const decoder = new TextDecoder('utf-8', { ignoreBOM: true })
  return decoded(marked ? 'UTF-8 with mark' : 'UTF-8', body, (units) => decoder.decode(units))
}

function decoded<Units extends Uint8Array | Uint16Array>(
  encoding: string,
  given: Units,
  textOf: (units: Units) => string,
): DecodedText {
  const units = given.includes(NEWLINE) || !given.includes(RETURN) ? given : withNewlines(given)
  return { encoding, units, text: (begin, end) => textOf(units.subarray(begin, end) as Units) }
}

function withNewlines<Units extends Uint8Array | Uint16Array>(units: Units): Units {
  return units.map((unit) => (unit === RETURN ? NEWLINE : unit)) as Units
}

interface Decoder {
  decode(bytes?: Uint8Array, options?: { readonly stream: boolean }): string
}
/** WHATWG Encoding, which Node and every browser have: pure, and no part of the language's own library. */
declare const TextDecoder: new (
  label: 'utf-8',
  options: { readonly fatal?: boolean; readonly ignoreBOM?: boolean },
) => Decoder

/** Overlong forms, lone surrogates and cut sequences are not. */
function isUtf8(bytes: Uint8Array): boolean {
  const decoder = new TextDecoder('utf-8', { fatal: true })
  try {
    for (let begin = 0; begin < bytes.length; begin += CHECKED_BYTES) {
      decoder.decode(bytes.subarray(begin, begin + CHECKED_BYTES), { stream: true })
    }
    decoder.decode()
    return true
  } catch {
    return false
  }
}
const CHECKED_BYTES = 1 << 16

/** UTF-16 without a mark shows in its zero bytes: nearly every second one, and none of the others. */
function silentUtf16(bytes: Uint8Array): boolean | null {
  const pairs = Math.min(bytes.length, 4096) >> 1
  if (pairs < 2) return null
  let even = 0
  let odd = 0
  for (let at = 0; at < pairs * 2; at += 2) {
    if (bytes[at] === 0) even++
    if (bytes[at + 1] === 0) odd++
  }
  if (odd > 0.7 * pairs && even < 0.02 * pairs) return true
  if (even > 0.7 * pairs && odd < 0.02 * pairs) return false
  return null
}

function utf16(bytes: Uint8Array, isLittle: boolean, encoding: string): DecodedText | NoText {
  const units = new Uint16Array(bytes.length >> 1)
  const low = isLittle ? 0 : 1
  let controls = 0
  for (let at = 0; at < units.length; at++) {
    const unit = bytes[2 * at + low] | (bytes[2 * at + 1 - low] << 8)
    if (unit < 9 || (unit > 13 && unit < 26)) controls++
    units[at] = unit
  }
  if (controls > 0.01 * units.length) return { looksLike: 'binary data' }
  return decoded(encoding, units, fromUnits)
}

/** Code units to a string in pieces: one call takes only so many arguments, and plain arrays pass fastest. */
const PIECE = 4096
function fromUnits(units: Uint16Array): string {
  const piece: number[] = new Array<number>(PIECE).fill(0)
  let text = ''
  for (let begin = 0; begin < units.length; begin += PIECE) {
    const size = Math.min(PIECE, units.length - begin)
    if (size < PIECE) piece.length = size
    for (let at = 0; at < size; at++) piece[at] = units[begin + at]
    text += String.fromCharCode.apply(null, piece)
  }
  return text
}

/** 0x80 to 0x9f, where Windows-1252 differs from Latin-1; its five holes stay control characters. */
const WINDOWS_1252 =
  '\u20ac\u0081\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\u008d\u017d\u008f' +
  '\u0090\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\u009d\u017e\u0178'

function windows1252(bytes: Uint8Array): string {
  const units = new Uint16Array(bytes.length)
  for (let at = 0; at < bytes.length; at++) {
    const byte = bytes[at]
    units[at] = byte >= 0x80 && byte <= 0x9f ? WINDOWS_1252.charCodeAt(byte - 0x80) : byte
  }
  return fromUnits(units)
}
