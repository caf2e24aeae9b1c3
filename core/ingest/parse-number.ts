/**
 * The strict number of a cell: the whole cell, decimal or scientific, nothing else. Written out because `parseFloat`
 * takes `1.2.3` for 1.2, and `Number` takes an empty cell for 0 and `0x10` for 16; and because a million sites are
 * read faster this way.
 */
const POINT = 46
const COMMA = 44

const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${n}`))

export type DecimalMark = '.' | ','

export function decimalCode(mark: DecimalMark): number {
  return mark === ',' ? COMMA : POINT
}

function isSpace(code: number): boolean {
  return code === 32 || code === 9 || code === 13 || code === 10 || code === 0xa0 || code === 0xfeff
}

/**
 * The cell's number times 10^shift, NaN if the cell isn't a number. The shift moves the decimal point before
 * rounding, so that a cell in mV gives the very double that the same value written in V gives.
 *
 * Accuracy: correctly rounded. Up to 15 digits and a power of ten to 22 the mantissa and the power are exact doubles
 * and one operation rounds once (W. D. Clinger, "How to read floating point numbers accurately", PLDI 1990, 92-101);
 * all else goes through `Number`.
 */
export function parseNumber(cell: string, decimal: number, shift: number): number {
  let at = 0
  let end = cell.length
  while (at < end && isSpace(cell.charCodeAt(at))) at++
  while (end > at && isSpace(cell.charCodeAt(end - 1))) end--
  const begin = at
  let code = at < end ? cell.charCodeAt(at) : 0
  const negative = code === 45 || code === 0x2212
  if (negative || code === 43) at++
  let mantissa = 0
  let digits = 0
  let significant = 0
  let fraction = 0
  let seenMark = false
  for (; at < end; at++) {
    code = cell.charCodeAt(at)
    if (code >= 48 && code <= 57) {
      digits++
      if (significant > 0 || code !== 48) significant++
      if (significant <= 15) mantissa = mantissa * 10 + (code - 48)
      if (seenMark) fraction++
    } else if (code === decimal && !seenMark) seenMark = true
    else break
  }
  if (digits === 0) return NaN
  let exponent = 0
  if (at < end) {
    exponent = parseExponent(cell, at, end)
    if (exponent !== exponent) return NaN
  }
  const power = exponent - fraction + shift
  if (significant > 15 || power > 22 || power < -22) return parseLong(cell.slice(begin, end), shift)
  const value = power < 0 ? mantissa / POWERS_OF_TEN[-power] : mantissa * POWERS_OF_TEN[power]
  return negative ? -value : value
}

/** NaN unless `cell` from `at` to `end` is an `e`, an optional sign and one to four digits. */
function parseExponent(cell: string, at: number, end: number): number {
  if ((cell.charCodeAt(at) | 32) !== 101) return NaN
  at++
  let sign = 1
  const first = cell.charCodeAt(at)
  if (first === 43 || first === 45 || first === 0x2212) {
    if (first !== 43) sign = -1
    at++
  }
  if (at >= end || end - at > 4) return NaN
  let exponent = 0
  for (; at < end; at++) {
    const digit = cell.charCodeAt(at) - 48
    if (!(digit >= 0 && digit <= 9)) return NaN
    exponent = exponent * 10 + digit
  }
  return sign * exponent
}

/** For many digits or large powers; the form was checked already. NaN if it is too large for a double. */
function parseLong(text: string, shift: number): number {
  const plain = text.replace(',', '.').replace(/\u2212/g, '-')
  const [mantissa = '', exponent = '0'] = plain.toLowerCase().split('e')
  const value = Number(`${mantissa}e${Number(exponent) + shift}`)
  return Number.isFinite(value) ? value : NaN
}

export function isBlank(cell: string): boolean {
  for (let at = 0; at < cell.length; at++) if (!isSpace(cell.charCodeAt(at))) return false
  return true
}

/** Why a cell that `parseNumber` refused isn't a number, in words. */
export function explainNumber(cell: string, mark: DecimalMark): string {
  const text = cell.trim().slice(0, 100)
  const other = mark === '.' ? ',' : '.'
  if (text === '') return 'is empty'
  if (/^[+-]?\d{1,3}([.,' \u00a0\u202f])\d{3}(\1\d{3})*([.,]\d+)?$/.test(text) && text.includes(other)) {
    return `has a thousands separator, or another decimal mark than this file's "${mark}"`
  }
  if (/^[+-]?\d{1,3}([' \u00a0\u202f]\d{3})+([.,]\d+)?$/.test(text)) return 'has a thousands separator'
  if (/^[+-]?\d*[.,]\d*(e[+-]?\d+)?$/i.test(text))
    return `has the decimal mark "${other}" where this file uses "${mark}"`
  if (/^[+-]?nan$/i.test(text)) return 'is NaN, no measured value'
  if (/^[+-]?(inf|infinity|∞|1\.#inf)$/i.test(text)) return 'is infinite'
  if (/^[+-]?\d+([.,]\d+)?e[+-]?\d+$/i.test(text)) return 'is too large a number'
  if (/^(ovld|ovl|ovf|o\.?l\.?|over(load|flow|range)?|\+?9\.9+e\+?37)$/i.test(text))
    return 'is an overload mark of the meter'
  if (/^-+$/.test(text)) return 'is a dash, no measured value'
  return 'is not a number'
}
