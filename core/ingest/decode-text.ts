/**
 * Bytes to text without a platform's decoder: UTF-8, UTF-16 either way, and Windows-1252 (which holds Latin-1) where
 * the bytes are no valid UTF-8.
 */
import { nonTextKind } from './text-signature'

export interface DecodedText {
  readonly text: string
  readonly encoding: string
}

export function decodeText(bytes: Uint8Array): DecodedText | { readonly looksLike: string } {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return utf16(bytes.subarray(2), true, 'UTF-16 LE with mark')
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return utf16(bytes.subarray(2), false, 'UTF-16 BE with mark')
  const silent = silentUtf16(bytes)
  if (silent !== null) return utf16(bytes, silent, silent ? 'UTF-16 LE' : 'UTF-16 BE')
  const looksLike = nonTextKind(bytes)
  if (looksLike !== null) return { looksLike }
  const marked = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf
  const body = marked ? bytes.subarray(3) : bytes
  if (isAscii(body)) return { text: fromUnits(body), encoding: marked ? 'UTF-8 with mark' : 'UTF-8' }
  const text = utf8(body)
  if (text !== null) return { text, encoding: marked ? 'UTF-8 with mark' : 'UTF-8' }
  return { text: windows1252(body), encoding: 'Windows-1252' }
}

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

function utf16(bytes: Uint8Array, isLittle: boolean, encoding: string): DecodedText | { readonly looksLike: string } {
  const units = new Uint16Array(bytes.length >> 1)
  const low = isLittle ? 0 : 1
  let controls = 0
  for (let at = 0; at < units.length; at++) {
    const unit = bytes[2 * at + low] | (bytes[2 * at + 1 - low] << 8)
    if (unit < 9 || (unit > 13 && unit < 26)) controls++
    units[at] = unit
  }
  if (controls > 0.01 * units.length) return { looksLike: 'binary data' }
  return { text: fromUnits(units), encoding }
}

function isAscii(bytes: Uint8Array): boolean {
  for (let at = 0; at < bytes.length; at++) if (bytes[at] > 127) return false
  return true
}

/** Code units to a string in pieces: one call takes only so many arguments, and plain arrays pass fastest. */
const PIECE = 4096
function fromUnits(units: Uint8Array | Uint16Array): string {
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

/** null where the bytes aren't valid UTF-8: overlong forms, lone surrogates and cut sequences are not. */
function utf8(bytes: Uint8Array): string | null {
  const units = new Uint16Array(bytes.length)
  let length = 0
  for (let at = 0; at < bytes.length;) {
    const lead = bytes[at]
    if (lead < 0x80) {
      units[length++] = lead
      at++
      continue
    }
    const size = lead >= 0xf0 ? 4 : lead >= 0xe0 ? 3 : 2
    if (lead < 0xc2 || lead > 0xf4 || at + size > bytes.length) return null
    let point = lead & (0xff >> (size + 1))
    for (let k = 1; k < size; k++) {
      const next = bytes[at + k]
      if ((next & 0xc0) !== 0x80) return null
      point = (point << 6) | (next & 0x3f)
    }
    const isWrong =
      (size === 3 && (point < 0x800 || (point >= 0xd800 && point <= 0xdfff))) ||
      (size === 4 && (point < 0x10000 || point > 0x10ffff))
    if (isWrong) return null
    if (point > 0xffff) {
      units[length++] = 0xd800 + ((point - 0x10000) >> 10)
      units[length++] = 0xdc00 + ((point - 0x10000) & 0x3ff)
    } else units[length++] = point
    at += size
  }
  return fromUnits(units.subarray(0, length))
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
