/** Cells and bytes: numbers in a style, quotation marks where they are needed, text in an encoding. */
import type { ExportStyle } from './export-style'
import type { Decimal } from './measured-lots'

export function numberCell({ digits, power }: Decimal, unitPower: number, style: ExportStyle): string {
  const exponent = power - unitPower
  const isScientific = style.numbers === 'scientific' || (style.numbers === 'mixed' && digits % 2 === 0)
  const text = isScientific || exponent < -20 || exponent > 12 ? scientific(digits, exponent) : plain(digits, exponent)
  return style.decimalMark === ',' ? text.replace('.', ',') : text
}

/** 1.2345E-02, or 12345e-6 where the digits stand whole. */
function scientific(digits: number, exponent: number): string {
  const whole = String(Math.abs(digits))
  const sign = digits < 0 ? '-' : ''
  if (digits % 3 === 0) return `${sign}${whole}e${exponent}`
  const shown = exponent + whole.length - 1
  const tail = whole.length > 1 ? `.${whole.slice(1)}` : ''
  return `${sign}${whole.charAt(0)}${tail}E${shown < 0 ? '-' : '+'}${String(Math.abs(shown)).padStart(2, '0')}`
}

function plain(digits: number, exponent: number): string {
  const sign = digits < 0 ? '-' : ''
  const whole = String(Math.abs(digits))
  if (exponent >= 0) return sign + whole + '0'.repeat(digits === 0 ? 0 : exponent)
  const padded = whole.padStart(1 - exponent, '0')
  return `${sign}${padded.slice(0, exponent)}.${padded.slice(exponent)}`
}

export function quoted(cell: string, { delimiter, quoteAll, padded }: ExportStyle): string {
  if (quoteAll || /["\r\n]/.test(cell) || cell.includes(delimiter)) return `"${cell.replace(/"/g, '""')}"`
  return padded && delimiter !== '\t' ? ` ${cell} ` : cell
}

export function encode(text: string, encoding: ExportStyle['encoding']): Uint8Array {
  const utf8 = new TextEncoder().encode(text)
  switch (encoding) {
    case 'utf8':
      return utf8
    case 'utf8-mark':
      return Uint8Array.from([0xef, 0xbb, 0xbf, ...utf8])
    case 'utf16le':
      return Uint8Array.from([0xff, 0xfe, ...utf16(text, true)])
    case 'utf16be':
      return Uint8Array.from([0xfe, 0xff, ...utf16(text, false)])
    case 'utf16le-silent':
      return Uint8Array.from(utf16(text, true))
    case 'windows-1252':
      // What it can't hold stays UTF-8.
      return [...text].every((sign) => sign.charCodeAt(0) < 256) ? Uint8Array.from([...text].map((sign) => sign.charCodeAt(0))) : utf8
  }
} // prettier-ignore

function utf16(text: string, isLittle: boolean): number[] {
  const bytes: number[] = []
  for (let at = 0; at < text.length; at++) {
    const pair = [text.charCodeAt(at) & 255, text.charCodeAt(at) >> 8]
    bytes.push(...(isLittle ? pair : pair.reverse()))
  }
  return bytes
}
