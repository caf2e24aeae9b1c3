/** How a prober may write a lot down: dialect, encoding, units, which columns, which form. */
import fc from 'fast-check'

/** A spelling of a unit and its power of ten of the base unit. */
export type Spelling = readonly [text: string, power: number]

const VOLTS: readonly Spelling[] = [
  ['V', 0], ['Volts', 0], ['mV', -3], ['millivolts', -3], ['µV', -6], ['μV', -6], ['uV', -6], ['microvolts', -6], ['nV', -9],
] // prettier-ignore
const AMPERES: readonly Spelling[] = [
  ['A', 0], ['Amps', 0], ['Ampere', 0], ['mA', -3], ['milliamps', -3], ['µA', -6], ['uA', -6], ['microamps', -6], ['nA', -9],
] // prettier-ignore
const OHMS: readonly Spelling[] = [
  ['ohm', 0], ['Ohm', 0], ['Ohms', 0], ['Ω', 0], ['V/A', 0], ['mV/mA', 0], ['mΩ', -3], ['mohm', -3], ['kΩ', 3], ['kohm', 3], ['Mohm', 6],
] // prettier-ignore
const OHMS_PER_SQUARE: readonly Spelling[] = [
  ['ohm/sq', 0], ['Ω/sq', 0], ['Ω/□', 0], ['ohms/square', 0], ['Ohm/sq.', 0], ['ohm/square', 0], ['ohms per square', 0], ['OHM/SQ', 0],
  ['mΩ/sq', -3], ['mohm/sq', -3], ['mΩ/□', -3], ['kΩ/sq', 3], ['kohm/sq', 3], ['kΩ/□', 3], ['Mohm/sq', 6],
] // prettier-ignore
const LENGTHS: readonly Spelling[] = [['mm', 0], ['cm', 1], ['um', -3], ['µm', -3], ['m', 3]] // prettier-ignore

/** Which quantities the file gives: V and I, in so many configurations and polarities; V/I; sheet resistance ready made. */
export const FORMS = [
  'single', 'single-reverse', 'dual', 'dual-reverse', 'ratio', 'ratio-dual', 'reported',
  'long-direction', 'long-configuration', 'long-both',
] as const // prettier-ignore
export type Form = (typeof FORMS)[number]

export const PLACES = ['none', 'plane', 'polar', 'dies', 'plane-and-dies'] as const
export type Places = (typeof PLACES)[number]

/** How the polarity shows: in both signs, in neither (both as magnitudes), or with the forward readings negative. */
export const SIGNS = ['signed', 'magnitudes', 'forward-negative'] as const

/** Columns that look like ours and are something else: never to be read in their stead. */
export const DECOYS = [
  'V offset', 'I limit (A)', 'Rs target (ohm/sq)', 'Rs spec', 'V std (mV)', 'Voltage range', 'V compliance', 'Rs sigma', 'T set (C)',
  'Comment', 'V max', 'Imax (mA)', 'Rs_ref', 'V noise (uV)', 'delta V', 'dV', 'Std Rs', 'Rs min', 'Rs max', 'Probe force (g)',
  'Thickness (um)', 'ID', 'Pass', 'Voltage setting', 'I set', 'Set current', 'Nominal current (mA)', 'Target V', 'Voltage limit (V)',
  'Power (W)', 'Contact resistance', 'R contact (ohm)', 'Rs error (%)', 'u(Rs)', 'V unc', 'I error (%)', 'x step', 'y step (mm)',
  'V gain', 'Rs lower limit', 'Rs upper limit', 'Current range (mA)', 'Open circuit voltage (mV)', 'Photo voltage', 'Old Rs',
  'Previous sheet resistance', 'Rs delta', 'Rs ratio', 'Rs goal', 'Rs@25C', 'temperature coefficient', 'Vth', 'Leakage current (nA)',
] as const // prettier-ignore

const HEADER_STYLES = ['round', 'square', 'underscore', 'blank', 'row', 'base'] as const
const ENCODINGS = ['utf8', 'utf8-mark', 'utf16le', 'utf16be', 'utf16le-silent', 'windows-1252'] as const
export type Encoding = (typeof ENCODINGS)[number]

const spelling = (list: readonly Spelling[]) => fc.constantFrom(...list)

export const exportStyles = fc.record({
  form: fc.constantFrom(...FORMS),
  places: fc.constantFrom(...PLACES),
  signs: fc.constantFrom(...SIGNS),
  delimiter: fc.constantFrom(',' as const, ';' as const, '\t' as const),
  decimalMark: fc.constantFrom('.' as const, ',' as const),
  lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
  encoding: fc.constantFrom(...ENCODINGS),
  quoteAll: fc.boolean(),
  padded: fc.boolean(),
  numbers: fc.constantFrom('plain' as const, 'scientific' as const, 'mixed' as const),
  headerStyle: fc.constantFrom(...HEADER_STYLES),
  words: fc.integer({ min: 0, max: 3 }),
  units: fc.record({
    voltage: spelling(VOLTS),
    current: spelling(AMPERES),
    resistance: spelling(OHMS),
    sheet: spelling(OHMS_PER_SQUARE),
    length: spelling(LENGTHS),
  }),
  /** The wafer as a column, or as a preamble and a header of its own before its rows. */
  wafers: fc.constantFrom('column' as const, 'blocks' as const),
  preamble: fc.constantFrom('none' as const, 'colon' as const, 'hash' as const, 'cells' as const, 'free text' as const),
  temperature: fc.boolean(),
  time: fc.boolean(),
  decoys: fc.oneof(
    { weight: 3, arbitrary: fc.constant<string[]>([]) },
    { weight: 1, arbitrary: fc.uniqueArray(fc.constantFrom<string>(...DECOYS), { minLength: 1, maxLength: 3 }) },
  ),
  /** Where each column stands: sorted by these. */
  order: fc.array(fc.integer({ min: 0, max: 99 }), { minLength: 32, maxLength: 32 }),
  footer: fc.constantFrom('none' as const, 'blank lines' as const, 'statistics' as const),
})

export type ExportStyle = Parameters<Parameters<typeof exportStyles.map>[0]>[0]
