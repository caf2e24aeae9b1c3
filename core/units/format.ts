/**
 * Numbers as people see them, on screen and on paper: one fixed form, no locale. Long numbers are grouped by narrow
 * spaces, minus signs are minus signs, powers of ten are real superscripts, and what is not a number is a dash.
 */

export const NO_VALUE = '–'
const MINUS = '−'
/** Narrow and non-breaking: a number is never split over two lines. */
const GROUP_SPACE = '\u202f'
const SUPERSCRIPTS: Readonly<Record<string, string>> = {
  '-': '⁻', '0': '⁰', '1': '¹', '2': '²', '3': '³', '4': '⁴', '5': '⁵', '6': '⁶', '7': '⁷', '8': '⁸', '9': '⁹',
} // prettier-ignore

/** Units whose values span decades and are always written with a power of ten. */
const SCIENTIFIC_UNITS: ReadonlySet<string> = new Set(['cm⁻³', 'cm⁻²', 'cm^-3', 'cm^-2'])

/** An integer as superscript: -3 as ⁻³. */
export function superscript(exponent: number): string {
  return [...String(exponent)].map((character) => SUPERSCRIPTS[character] ?? character).join('')
}

/** A fixed number of decimals; none of them is an exponent. */
export function formatFixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return notFinite(value)
  const places = Math.min(100, Math.max(0, decimals))
  // toFixed turns to exponents at 1e21; BigInt does not.
  const magnitude = Math.abs(value)
  const plain = magnitude < 1e21 ? magnitude.toFixed(places) : BigInt(Math.round(magnitude)).toString()
  return withSign(value, plain, Number(plain) === 0)
}

/** So many significant digits in plain notation: 12340.6 with 4 is 12 340. */
export function formatSignificant(value: number, digits: number): string {
  if (!Number.isFinite(value)) return notFinite(value)
  if (value === 0) return formatFixed(0, digits - 1)
  const exponent = decimalExponent(value, digits)
  const decimals = digits - 1 - exponent
  return decimals >= 0 ? formatFixed(value, decimals) : formatFixed(roundToPlace(value, -decimals), 0)
}

/** 1.43 × 10¹⁹; zero is 0. */
export function formatScientific(value: number, digits: number): string {
  if (!Number.isFinite(value)) return notFinite(value)
  if (value === 0) return '0'
  const [mantissa, exponent] = split(Math.abs(value), digits)
  return `${value < 0 ? MINUS : ''}${mantissa} × 10${superscript(exponent)}`
}

/** 1.43 × 10¹⁹ cm⁻³. A dose takes `cm⁻²` as its unit. */
export function formatConcentration(value: number, unit: 'cm⁻³' | 'cm⁻²' = 'cm⁻³'): string {
  return withUnit(formatScientific(value, 3), unit)
}

/** Two decimals: 1.37 %. */
export function formatPercent(value_percent: number): string {
  return withUnit(formatFixed(value_percent, 2), '%')
}

/** One decimal: −63.5 mm. */
export function formatMm(value_mm: number): string {
  return withUnit(formatFixed(value_mm, 1), 'mm')
}

/** The value alone, in the form its unit asks for. */
export function formatNumber(value: number, unit: string): string {
  if (unit === '%') return formatFixed(value, 2)
  if (unit === 'mm') return formatFixed(value, 1)
  if (unit === 'Ω/sq') return formatSignificant(value, 4)
  if (SCIENTIFIC_UNITS.has(unit)) return formatScientific(value, 3)
  return needsPower(value) ? formatScientific(value, 4) : formatSignificant(value, 4)
}

/** The value in the form its unit asks for, and the unit. An empty unit is a pure number. */
export function formatQuantity(value: number, unit: string): string {
  return withUnit(formatNumber(value, unit), unit)
}

/**
 * Value ± standard uncertainty. The uncertainty shows two digits and decides how many the value shows (JCGM 100:2008,
 * 7.2.6). Without one the value stands alone.
 */
export function formatWithUncertainty(value: number, u: number, unit: string): string {
  if (!Number.isFinite(value) || !(u > 0) || !Number.isFinite(u)) return formatQuantity(value, unit)
  if (SCIENTIFIC_UNITS.has(unit) || (unit !== 'Ω/sq' && needsPower(value))) return scientificPair(value, u, unit)
  const text = `${formatToUncertainty(value, u)} ± ${formatSignificant(u, 2)}`
  return withUnit(unit === '%' || unit === '°C' ? `(${text})` : text, unit)
}

/** The value alone with the digits its uncertainty allows: 92.134 with u = 0.28 is 92.13. */
export function formatToUncertainty(value: number, u: number): string {
  if (!(u > 0) || !Number.isFinite(u)) return formatSignificant(value, 4)
  const decimals = decimalsOf(u)
  return decimals >= 0 ? formatFixed(value, decimals) : formatFixed(roundToPlace(value, -decimals), 0)
}

/** Decimals at which two digits of an uncertainty end; negative for tens and hundreds. */
export function decimalsOf(u: number): number {
  return 1 - decimalExponent(u, 2)
}

function scientificPair(value: number, u: number, unit: string): string {
  const exponent = decimalExponent(value === 0 ? u : value, 3)
  const scale = 10 ** exponent
  const text = `(${formatToUncertainty(value / scale, u / scale)} ± ${formatSignificant(u / scale, 2)})`
  return withUnit(`${text} × 10${superscript(exponent)}`, unit)
}

function needsPower(value: number): boolean {
  const magnitude = Math.abs(value)
  return magnitude !== 0 && Number.isFinite(value) && (magnitude < 1e-3 || magnitude >= 1e6)
}

function withUnit(number: string, unit: string): string {
  return number === NO_VALUE || unit === '' || unit === '1' ? number : `${number} ${unit}`
}

function notFinite(value: number): string {
  if (Number.isNaN(value)) return NO_VALUE
  return value > 0 ? '∞' : `${MINUS}∞`
}

/** The power of ten after rounding to so many digits: 99.96 with 3 is 2, since it is written 100. */
function decimalExponent(value: number, digits: number): number {
  return split(Math.abs(value), digits)[1]
}

function split(magnitude: number, digits: number): readonly [string, number] {
  const [mantissa = '0', exponent = '0'] = magnitude.toExponential(digits - 1).split('e')
  return [mantissa, Number(exponent)]
}

function roundToPlace(value: number, place: number): number {
  const scale = 10 ** place
  return Math.round(value / scale) * scale
}

function withSign(value: number, plain: string, isZero: boolean): string {
  return `${value < 0 && !isZero ? MINUS : ''}${grouped(plain)}`
}

/** Thousands from five digits on, before the point only. */
function grouped(plain: string): string {
  const [whole = '', fraction] = plain.split('.')
  const spaced = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, GROUP_SPACE) : whole
  return fraction === undefined ? spaced : `${spaced}.${fraction}`
}
