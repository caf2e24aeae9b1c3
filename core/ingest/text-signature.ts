/** What bytes that aren't text look like. */
interface Signature {
  readonly bytes: readonly number[]
  readonly looksLike: string
}

const SIGNATURES: readonly Signature[] = [
  { bytes: [0x89, 0x50, 0x4e, 0x47], looksLike: 'a PNG picture' },
  { bytes: [0x25, 0x50, 0x44, 0x46, 0x2d], looksLike: 'a PDF document' },
  { bytes: [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1], looksLike: 'an old-style workbook or office document (XLS, DOC)' },
  { bytes: [0xff, 0xd8, 0xff], looksLike: 'a JPEG picture' },
  { bytes: [0x47, 0x49, 0x46, 0x38], looksLike: 'a GIF picture' },
  { bytes: [0x1f, 0x8b, 0x08], looksLike: 'a gzip archive' },
  { bytes: [0x37, 0x7a, 0xbc, 0xaf], looksLike: 'a 7z archive' },
  { bytes: [0x53, 0x51, 0x4c, 0x69, 0x74, 0x65, 0x20], looksLike: 'a database file' },
]
const ZIP = [0x50, 0x4b]

/** A text may hold the odd control byte of an instrument; more than this share isn't text. */
const MAX_CONTROL_SHARE = 0.005
const SAMPLE_BYTES = 65536

/** What the bytes are if they are no text, else null. UTF-16 must have been recognised before. */
export function nonTextKind(bytes: Uint8Array): string | null {
  const known = SIGNATURES.find((signature) => startsWith(bytes, signature.bytes))
  if (known) return known.looksLike
  if (startsWith(bytes, ZIP) && bytes[2] <= 8 && bytes[3] <= 8) return zipKind(bytes)
  return controlBytes(bytes) > MAX_CONTROL_SHARE * Math.min(bytes.length, SAMPLE_BYTES) ? 'binary data' : null
}

function startsWith(bytes: Uint8Array, start: readonly number[]): boolean {
  return bytes.length >= start.length && start.every((byte, at) => bytes[at] === byte)
}

/** An Excel workbook is a ZIP archive whose entry names, kept as plain bytes, begin with `xl/`. */
function zipKind(bytes: Uint8Array): string {
  const ends = [...bytes.subarray(0, 4096), ...bytes.subarray(Math.max(4096, bytes.length - 4096))]
  const names = String.fromCharCode(...ends)
  if (names.includes('xl/')) return 'an XLSX workbook (save it as CSV)'
  if (names.includes('opendocument.spreadsheet')) return 'an ODS workbook (save it as CSV)'
  return 'a ZIP archive'
}

function controlBytes(bytes: Uint8Array): number {
  let count = 0
  const end = Math.min(bytes.length, SAMPLE_BYTES)
  for (let at = 0; at < end; at++) {
    const byte = bytes[at]
    const isControl = byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12 && byte !== 26 && byte !== 27
    // A zero byte has no business in 8-bit text at all.
    if (isControl) count += byte === 0 ? 8 : 1
  }
  return count
}
