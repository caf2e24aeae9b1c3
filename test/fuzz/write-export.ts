/** A measured lot written down in a style: the text of the export, and what a right reading of it must give. */
import { valueOf, type Decimal, type MeasuredLot, type MeasuredPair, type MeasuredSite } from './measured-lots'
import type { ExportStyle, Spelling } from './export-style'
import { encode, numberCell, quoted } from './write-cells'

export interface WrittenExport {
  /** Lines before they are joined, so that a test may cut, double and swap them. */
  readonly lines: readonly string[]
  readonly text: string
  readonly bytes: Uint8Array
  /** The 0-based lines that hold readings, and which site each belongs to. */
  readonly rows: readonly { readonly line: number; readonly site: number }[]
  readonly headers: readonly string[]
  /** As the file names them, in its order. */
  readonly sites: readonly MeasuredSite[]
}

interface Column {
  readonly name: string
  readonly unit: Spelling | null
  readonly cell: (site: MeasuredSite, part: Part) => string
}

/** The reading of a site that a row holds. */
interface Part {
  readonly isReverse: boolean
  readonly isB: boolean
}
const FORWARD_A: Part = { isReverse: false, isB: false }

export function isLong(style: ExportStyle): boolean {
  return style.form.startsWith('long')
}

export function hasReverse({ form }: ExportStyle): boolean {
  return ['single-reverse', 'dual-reverse', 'long-direction', 'long-both'].includes(form)
}

export function hasB({ form }: ExportStyle): boolean {
  return ['dual', 'dual-reverse', 'ratio-dual', 'long-configuration', 'long-both'].includes(form)
}

export function writeExport(lot: MeasuredLot, style: ExportStyle): WrittenExport {
  const sites = style.wafers === 'blocks' ? withPlainWafers(lot.sites) : lot.sites
  const columns = ordered(columnsOf(style), style.order)
  const lines: string[] = []
  const rows: { line: number; site: number }[] = []
  const join = (cells: readonly string[]) => cells.map((cell) => quoted(cell, style)).join(style.delimiter)
  const headerLines = () => {
    lines.push(join(columns.map((column) => headerOf(column, style))))
    if (style.headerStyle === 'row') lines.push(join(columns.map(({ unit }) => (unit ? `(${unit[0]})` : '-'))))
  }
  lines.push(...preamble(lot.lot, style))
  let wafer: string | null = null
  if (style.wafers === 'column') headerLines()
  sites.forEach((site, index) => {
    if (style.wafers === 'blocks' && site.wafer !== wafer) {
      lines.push(...(wafer === null ? [] : ['']), `Wafer: ${site.wafer}`)
      headerLines()
    }
    wafer = site.wafer
    for (const part of partsOf(style)) {
      rows.push({ line: lines.length, site: index })
      lines.push(join(columns.map((column) => column.cell(site, part))))
    }
  })
  lines.push(...footer(columns.length, style, join))
  const text = lines.join(style.lineEnd) + style.lineEnd
  const headers = columns.map((column) => headerOf(column, style))
  return { lines, text, bytes: encode(text, style.encoding), rows, headers, sites }
}

function withPlainWafers(sites: readonly MeasuredSite[]): readonly MeasuredSite[] {
  const names = [...new Set(sites.map(({ wafer }) => wafer))]
  return sites.map((site) => ({ ...site, wafer: String(names.indexOf(site.wafer) + 1) }))
}

function partsOf({ form }: ExportStyle): readonly Part[] {
  const reverse = { isReverse: true, isB: false }
  const b = { isReverse: false, isB: true }
  if (form === 'long-direction') return [FORWARD_A, reverse]
  if (form === 'long-configuration') return [FORWARD_A, b]
  return form === 'long-both' ? [FORWARD_A, reverse, b, { isReverse: true, isB: true }] : [FORWARD_A]
}

function ordered(columns: readonly Column[], order: readonly number[]): Column[] {
  const keyed = columns.map((column, at) => ({ column, key: order[at] ?? 0 }))
  return keyed.sort((one, other) => one.key - other.key).map(({ column }) => column)
}

function pick(words: readonly string[], { words: at }: ExportStyle): string {
  return words[at % words.length]
}

function columnsOf(style: ExportStyle): Column[] {
  const text = (words: readonly string[], cell: (site: MeasuredSite, part: Part) => string): Column => ({
    name: pick(words, style),
    unit: null,
    cell,
  })
  return [
    ...(style.wafers === 'column' ? [text(['wafer', 'Wafer ID', 'Wafer', 'wafer no'], ({ wafer }) => wafer)] : []),
    text(['site', 'Site', 'Point', 'Site No'], ({ site }) => site),
    ...placeColumns(style),
    ...electricalColumns(style),
    ...(style.temperature ? [temperatureColumn(style)] : []),
    ...(style.time ? [text(['time', 'Timestamp'], () => '2026-03-04 14:22:05')] : []),
    ...style.decoys.map((name, at) => text([name], (site) => decoyCell(at, site, style))),
  ]
}

function decoyCell(at: number, site: MeasuredSite, style: ExportStyle): string {
  return numberCell({ digits: 3 + at * 17 + site.a.voltage.digits, power: -3 }, 0, style)
}

function placeColumns(style: ExportStyle): Column[] {
  const { places, units } = style
  const length = style.headerStyle === 'base' ? null : units.length
  const shift = length?.[1] ?? 0
  const place = (words: readonly string[], value: (site: MeasuredSite) => Decimal): Column => ({
    name: pick(words, style),
    unit: length,
    cell: (site) => numberCell(value(site), shift, style),
  })
  const dies: Column[] = [
    { name: 'die_x', unit: null, cell: ({ dieX }) => String(dieX) },
    { name: 'die_y', unit: null, cell: ({ dieY }) => String(dieY) },
  ]
  const plane = [place(['x', 'X', 'X pos', 'x'], ({ x_mm }) => x_mm), place(['y', 'Y', 'Y pos', 'y'], ({ y_mm }) => y_mm)]
  const angle: Column = { name: pick(['theta', 'Angle', 'θ', 'phi'], style), unit: null, cell: (site) => String(angleOf(site)) }
  if (places === 'plane') return plane
  if (places === 'dies') return dies
  if (places === 'plane-and-dies') return [...plane, ...dies]
  if (places === 'polar') return [place(['r', 'Radius', 'R', 'radius'], radiusOf), { ...angle, unit: ['deg', 0] }]
  return []
} // prettier-ignore

/** The polar places are their own pattern, a turn of 40 degrees a site: r and theta whole numbers. */
export function polarPlace(site: MeasuredSite): { readonly r_mm: number; readonly theta_deg: number } {
  return { r_mm: valueOf(radiusOf(site)), theta_deg: angleOf(site) }
}

function radiusOf({ x_mm, y_mm }: MeasuredSite): Decimal {
  return { digits: Math.abs(x_mm.digits) + Math.abs(y_mm.digits), power: -1 }
}

function angleOf({ x_mm, y_mm }: MeasuredSite): number {
  return Math.round((Math.atan2(y_mm.digits, x_mm.digits) * 180) / Math.PI)
}

function electricalColumns(style: ExportStyle): Column[] {
  const { form, units } = style
  if (form === 'reported') {
    const sheet = ({ a }: MeasuredSite) => readyMade(a)
    return [ready(['Rs', 'Sheet resistance', 'Rsheet', 'Sheet Res'], units.sheet, sheet, style)]
  }
  if (form === 'ratio') return [ready(['V/I', 'V over I', 'V/I', 'V/I ratio'], units.resistance, ({ a }) => readyMade(a), style)]
  if (form === 'ratio-dual') {
    return [
      ready(['V/I A', 'V/I (A)', 'V/I a', 'V/I config A'], units.resistance, ({ a }) => readyMade(a), style),
      ready(['V/I B', 'V/I (B)', 'V/I b', 'V/I config B'], units.resistance, ({ b }) => readyMade(b), style),
    ]
  }
  if (isLong(style)) return longColumns(style)
  const sides: readonly (readonly [Part, keyof typeof WORDS])[] = [
    [FORWARD_A, hasReverse(style) || hasB(style) ? 'forward' : 'plain'],
    ...(hasReverse(style) ? [[{ isReverse: true, isB: false }, 'reverse'] as const] : []),
    ...(hasB(style) ? [[{ isReverse: false, isB: true }, 'b'] as const] : []),
    ...(hasB(style) && hasReverse(style) ? [[{ isReverse: true, isB: true }, 'reverseB'] as const] : []),
  ]
  return sides.flatMap(([part, words]) => pairColumns(part, words, style))
} // prettier-ignore

const WORDS = {
  plain: { v: ['V', 'Voltage', 'Measured voltage', 'U'], i: ['I', 'Current', 'Source current', 'I14'] },
  forward: { v: ['V fwd', 'Voltage forward', 'V+', 'V pos'], i: ['I fwd', 'Current forward', 'I+', 'I pos'] },
  reverse: { v: ['V rev', 'Voltage reverse', 'V-', 'V neg'], i: ['I rev', 'Current reverse', 'I-', 'I neg'] },
  b: { v: ['V B', 'Voltage B', 'V24', 'Vb'], i: ['I B', 'Current B', 'I13', 'Ib'] },
  reverseB: {
    v: ['V B rev', 'Voltage B reverse', 'V24 rev', 'V b neg'],
    i: ['I B rev', 'Current B reverse', 'I13 rev', 'I b neg'],
  },
} as const

function pairColumns(part: Part, words: keyof typeof WORDS, style: ExportStyle): Column[] {
  return [
    electrical(WORDS[words].i, 'current', () => part, style),
    electrical(WORDS[words].v, 'voltage', () => part, style),
  ]
}

function longColumns(style: ExportStyle): Column[] {
  const own = (part: Part) => part
  const directions = [['+', '-'], ['forward', 'reverse'], ['fwd', 'rev'], ['pos', 'neg']][style.words]
  const direction: Column = {
    name: pick(['direction', 'Polarity', 'Current direction', 'polarity'], style),
    unit: null,
    cell: (_, { isReverse }) => directions[isReverse ? 1 : 0],
  }
  const configuration: Column = {
    name: pick(['config', 'Configuration', 'Probe config', 'cfg'], style),
    unit: null,
    cell: (_, { isB }) => (isB ? 'B' : 'A'),
  }
  return [
    ...(style.form === 'long-configuration' ? [] : [direction]),
    ...(style.form === 'long-direction' ? [] : [configuration]),
    electrical(WORDS.plain.i.slice(0, 3), 'current', own, style),
    electrical(WORDS.plain.v, 'voltage', own, style),
  ]
} // prettier-ignore

function electrical(
  words: readonly string[],
  quantity: 'current' | 'voltage',
  partOf: (part: Part) => Part,
  style: ExportStyle,
): Column {
  const unit = style.headerStyle === 'base' ? null : style.units[quantity]
  return {
    name: pick(words, style),
    unit,
    cell: (site, row) => {
      const part = partOf(row)
      const { digits, power } = pairOf(site, part)[quantity]
      const isNegative =
        style.signs === 'signed' ? part.isReverse : style.signs === 'forward-negative' ? !part.isReverse : false
      return numberCell({ digits: isNegative ? -digits : digits, power }, unit?.[1] ?? 0, style)
    },
  }
}

function pairOf({ a, aReverse, b, bReverse }: MeasuredSite, { isReverse, isB }: Part): MeasuredPair {
  return isB ? (isReverse ? bReverse : b) : isReverse ? aReverse : a
}

/** A value that stands in the file as it is: the voltage's digits, between 0.02 and 95 kilo. */
export function readyMade({ voltage: { digits, power } }: MeasuredPair): Decimal {
  return { digits, power: power + 3 }
}

function ready(words: readonly string[], unit: Spelling, value: (site: MeasuredSite) => Decimal, style: ExportStyle): Column {
  const named = style.headerStyle === 'base' ? null : unit
  return { name: pick(words, style), unit: named, cell: (site) => numberCell(value(site), named?.[1] ?? 0, style) }
} // prettier-ignore

function temperatureColumn(style: ExportStyle): Column {
  const unit: Spelling = [pick(['C', '°C', 'degC', 'C'], style), 0]
  const name = pick(['Temperature', 'Temp', 'Wafer temperature', 'Chuck temp'], style)
  return { name, unit, cell: (site) => numberCell(site.temperature, 0, style) }
}

function headerOf({ name, unit }: Column, { headerStyle }: ExportStyle): string {
  if (unit === null || headerStyle === 'row') return name
  // "V+_mV" is nobody's header; nor is a unit of several words run onto a name.
  const isPlain = /^[\w ]+$/.test(name) && /^[^\s./]+$/.test(unit[0])
  if (headerStyle === 'underscore' && isPlain) return `${name}_${unit[0]}`
  if (headerStyle === 'blank' && isPlain) return `${name} ${unit[0]}`
  return headerStyle === 'square' ? `${name} [${unit[0]}]` : `${name} (${unit[0]})`
}

function preamble(lot: string, { preamble: kind, delimiter }: ExportStyle): string[] {
  switch (kind) {
    case 'none':
      return []
    case 'colon':
      return [`Lot: ${lot}`, 'Operator: K. Imber', 'Recipe: 49 sites', '']
    case 'hash':
      return [`# lot=${lot}`, '# operator=K. Imber']
    case 'cells':
      return [`Lot${delimiter}${lot}`, `Tool${delimiter}Prober 2`, '']
    case 'free text':
      return ['Four-point probe export', 'Tern Bay pilot line, bay 3', '']
  }
}

function footer(width: number, { footer: kind }: ExportStyle, join: (cells: readonly string[]) => string): string[] {
  if (kind === 'none') return []
  const blank = ['', '']
  return kind === 'blank lines' ? blank : [...blank, join(['Mean', ...new Array<string>(width - 1).fill('1')])]
}
