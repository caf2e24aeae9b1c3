/**
 * Every unit a prober's file may carry, by quantity, with the spellings in use. Inside core each quantity has one
 * unit, its base; files are converted when they are read, by `value * scale + offset`.
 */
export type Quantity =
  'voltage' | 'current' | 'length' | 'angle' | 'resistance' | 'sheet-resistance' | 'resistivity' | 'temperature'

export interface Unit {
  /** How we write it: plain ASCII, e.g. `uV`, `ohm/sq`, `mohm.cm`. */
  readonly id: string
  readonly quantity: Quantity
  readonly scale: number
  readonly offset: number
  /** The exponent where the unit is a power of ten of the base, so that `3.5 mV` becomes exactly 0.0035. */
  readonly power10: number | null
}

export const BASE_UNITS = {
  voltage: 'V',
  current: 'A',
  length: 'mm',
  angle: 'deg',
  resistance: 'ohm',
  'sheet-resistance': 'ohm/sq',
  resistivity: 'ohm.cm',
  temperature: 'C',
} as const satisfies Record<Quantity, string>

interface Entry {
  readonly unit: Unit
  readonly spellings: readonly string[]
}

function decimal(quantity: Quantity, id: string, power10: number, ...spellings: string[]): Entry {
  return { unit: { id, quantity, scale: 10 ** power10, offset: 0, power10 }, spellings: [id, ...spellings] }
}

function affine(quantity: Quantity, id: string, scale: number, offset: number, ...spellings: string[]): Entry {
  return { unit: { id, quantity, scale, offset, power10: null }, spellings: [id, ...spellings] }
}

function ohms(power10: number, prefix: string): Entry[] {
  return [
    decimal('resistance', `${prefix}ohm`, power10),
    decimal('sheet-resistance', `${prefix}ohm/sq`, power10, `${prefix}ohmpersq`),
    decimal('resistivity', `${prefix}ohm.cm`, power10),
    decimal('resistivity', `${prefix}ohm.m`, power10 + 2),
  ]
}

const ENTRIES: readonly Entry[] = [
  decimal('voltage', 'nV', -9, 'nanovolt', 'nanovolts'),
  decimal('voltage', 'uV', -6, 'microvolt', 'microvolts'),
  decimal('voltage', 'mV', -3, 'millivolt', 'millivolts'),
  decimal('voltage', 'V', 0, 'volt', 'volts'),
  decimal('current', 'nA', -9, 'nanoamp', 'nanoamps'),
  decimal('current', 'uA', -6, 'microamp', 'microamps'),
  decimal('current', 'mA', -3, 'milliamp', 'milliamps'),
  decimal('current', 'A', 0, 'amp', 'amps', 'ampere', 'amperes'),
  decimal('length', 'nm', -6),
  decimal('length', 'um', -3, 'micron', 'microns', 'micrometer', 'micrometre'),
  decimal('length', 'mm', 0, 'millimeter', 'millimetre', 'millimeters', 'millimetres'),
  decimal('length', 'cm', 1, 'centimeter', 'centimetre'),
  decimal('length', 'm', 3, 'meter', 'metre'),
  affine('length', 'in', 25.4, 0, 'inch', 'inches'),
  affine('length', 'mil', 0.0254, 0, 'mils'),
  ...ohms(-9, 'n'),
  ...ohms(-6, 'u'),
  ...ohms(-3, 'm'),
  ...ohms(0, ''),
  ...ohms(3, 'k'),
  ...ohms(6, 'M'),
  decimal('resistance', 'V/A', 0, 'mV/mA', 'uV/uA'),
  affine('temperature', 'C', 1, 0, 'degC', 'celsius', 'degreesC'),
  affine('temperature', 'K', 1, -273.15, 'kelvin'),
  affine('temperature', 'F', 5 / 9, -160 / 9, 'degF', 'fahrenheit'),
  affine('angle', 'deg', 1, 0, 'degree', 'degrees'),
  affine('angle', 'rad', 180 / Math.PI, 0, 'radian', 'radians'),
]

/** One spelling for the many ways to write the same signs; text that went through a wrong decoding once is mended. */
export function plainText(text: string): string {
  return text
    .replace(/Â(?=[µ°²·])/g, '')
    .replace(/Î©|â„¦/g, 'Ω')
    .replace(/Î¼/g, 'μ')
    .normalize('NFKC')
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/[□◻▢⎕▫☐◽]/g, 'sq')
    .trim()
}

/** Capitals are kept, they tell milli from mega; an all-capital OHM can't be told and is left to the second look-up. */
function unitKey(text: string): string {
  return plainText(text)
    .replace(/μ/g, 'u')
    .replace(/[Ωω]/g, 'ohm')
    .replace(/°/g, 'deg')
    .replace(/[\s._·⋅∙*×/\\^-]/g, '')
    .replace(/[Oo]hms?(?!q)/g, 'ohm')
    .replace(/per(?=s)/i, '')
    .replace(/(?<=ohm)s(?:quare|qr|q)s?$/i, 'sq')
}

const exact = new Map<string, Unit>()
const folded = new Map<string, Unit | null>()
for (const { unit, spellings } of ENTRIES) {
  for (const spelling of spellings) {
    const key = unitKey(spelling)
    exact.set(key, unit)
    const fold = key.toLowerCase()
    const other = folded.get(fold)
    folded.set(fold, other === undefined || other === unit ? unit : null)
  }
}

export const units: readonly Unit[] = ENTRIES.map((entry) => entry.unit)

/** The unit of a spelling, or null. `MOHM` is refused: written in capitals, milli and mega can't be told apart. */
export function findUnit(text: string): Unit | null {
  if (text.length > 40) return null
  const key = unitKey(text)
  return exact.get(key) ?? folded.get(key.toLowerCase()) ?? null
}

/** The ids of a quantity's units, for a sentence that says what is understood. */
export function unitNames(quantity: Quantity): readonly string[] {
  return units.filter((unit) => unit.quantity === quantity).map((unit) => unit.id)
}

export function baseUnit(quantity: Quantity): Unit {
  return findUnit(BASE_UNITS[quantity])!
}

/** A value in the quantity's base unit. */
export function toBase(value: number, unit: Unit): number {
  if (unit.power10 !== null && unit.power10 < 0) return value / 10 ** -unit.power10
  return value * unit.scale + unit.offset
}
