/** What goes wrong with a file between prober and reader: by hand, by a spreadsheet, by a cut transfer. */
import fc from 'fast-check'
import { encode } from './write-cells'
import type { WrittenExport } from './write-export'
import type { ExportStyle } from './export-style'

export const TRAP_CELLS = [
  '', ' ', '0', '-0', '1', '-1', '1e29', '-1e29', '1e30', '1e-300', '1e300', '5e-324', '9.9E37', '1e999', 'NaN', 'nan', 'inf', '-Infinity', '∞',
  '--', '-', '+', '.', ',', 'e', '1e', '1.2.3', '1,2,3', '1.234,5', '1,234.5', "1'234", '0x10', '1_000', '12 mV', '3%', '½', '１２', '٣', '1e5.5',
  'OVLD', 'OL', '#N/A', '#DIV/0!', '=1+1', "'=1+1", '+1-2', '@SUM(A1)', 'null', 'none', 'n/a', 'TRUE', 'Mean', 'Std Dev', 'lot: X', 'wafer',
  '"', '""', '"a', 'a"b', '\u0000', '\u0007', '\uFEFF', '\uFEFF1', '\u202e1', '\u2028', '\u00a01', '−5', '1 000', '𝟓', 'x'.repeat(300), '1'.repeat(400),
  '1e-29', '1e28', '4.9e-320', 'toString', '__proto__', 'constructor', '2026-03-04', '12:00', 'a,b', 'a;b', 'a\tb',
] as const // prettier-ignore

const TRAP_HEADERS = [
  '', 'V', 'I', 'V (mV)', 'I (mA)', 'x', 'y', 'site', 'wafer', 'Rs', 'V/I', 'rho (ohm.cm)', 'temp', 'die_x', 'theta', 'r', 'V (kV/m)', 'I [mm]',
  'Rs (MOHM)', 'x (inch)', 'y (mil)', 'T (K)', 'T (F)', 'config', 'direction', 'V rev', 'I rev', 'V B', 'lot', 'slot', 'time', 'date', '"', '=cmd', '\u0000V',
  '__proto__', 'current_A', 'voltage_V', 'voltage_b_V', 'v_over_i_b_ohm', 'resistivity_ohm_cm', 'r_mm', 'theta_deg', 'V'.repeat(200), '(((', 'Ω', 'θ (rad)',
] as const // prettier-ignore

const TRAP_LINES = [
  '', ',,,,', ';;;', '\t', '"', '""', 'sep=;', 'lot: TB-0999', 'Wafer: 7', 'slot,3', 'Temperature: 300 K', 'temp: hot', 'end of data', 'Mean,1,2,3',
  'wafer,site,V,I', 'site;Rs', '1', '1,2,3,4,5,6,7,8,9,10,11,12,13,14,15,16,17,18,19,20', '# comment', '----', '\u0000\u0000', '﻿site,Rs', '(mm),(V)', 'x'.repeat(5000),
] as const // prettier-ignore

type Spoiling = (lines: string[], headerAt: number, delimiter: string) => void

const at = fc.nat({ max: 10_000 })
const spoilings: fc.Arbitrary<Spoiling> = fc.oneof(
  { weight: 6, arbitrary: fc.tuple(at, at, fc.constantFrom(...TRAP_CELLS)).map(([row, cell, trap]): Spoiling => replaceCell(row, cell, trap)) },
  { weight: 2, arbitrary: fc.tuple(at, fc.constantFrom(...TRAP_HEADERS)).map(([cell, trap]): Spoiling => (lines, header, delimiter) => setCell(lines, header, cell, trap, delimiter)) },
  fc.tuple(at, at).map(([cell, other]): Spoiling => (lines, header, delimiter) => {
    const cells = (lines[header] ?? '').split(delimiter)
    setCell(lines, header, cell, cells[other % cells.length], delimiter)
  }),
  fc.tuple(at, at).map(([row, length]): Spoiling => (lines) => edit(lines, row, (line) => line.slice(0, length % (line.length + 1)))),
  at.map((row): Spoiling => (lines) => void lines.splice(row % lines.length, 1)),
  fc.tuple(at, at).map(([from, to]): Spoiling => (lines) => void lines.splice(to % lines.length, 0, lines[from % lines.length])),
  fc.tuple(at, at).map(([from, to]): Spoiling => (lines) => {
    const [one, other] = [from % lines.length, to % lines.length]
    ;[lines[one], lines[other]] = [lines[other], lines[one]]
  }),
  fc.tuple(at, at, fc.constantFrom('"', "'", '\u0000', '\uFEFF', '\r', '\n', '\r\n', '\u0085', ',', ';', '\t', '\ud800', '=')).map(([row, place, sign]): Spoiling => (lines) =>
    edit(lines, row, (line) => line.slice(0, place % (line.length + 1)) + sign + line.slice(place % (line.length + 1)))),
  fc.tuple(at, fc.constantFrom(...TRAP_LINES)).map(([row, line]): Spoiling => (lines) => void lines.splice(row % lines.length, 0, line)),
  // A whole column of traps, a whole column dropped.
  fc.tuple(at, fc.constantFrom(...TRAP_CELLS)).map(([cell, trap]): Spoiling => (lines, header, delimiter) => {
    for (let row = header + 1; row < lines.length; row++) setCell(lines, row, cell, trap, delimiter)
  }),
  at.map((cell): Spoiling => (lines, _, delimiter) => {
    lines.forEach((line, row) => {
      const cells = line.split(delimiter)
      if (cells.length > 1) lines[row] = cells.filter((__, place) => place !== cell % cells.length).join(delimiter)
    })
  }),
) // prettier-ignore

function replaceCell(row: number, cell: number, trap: string): Spoiling {
  return (lines, header, delimiter) => {
    const below = lines.length - header - 1
    if (below > 0) setCell(lines, header + 1 + (row % below), cell, trap, delimiter)
  }
}

function setCell(lines: string[], row: number, cell: number, text: string, delimiter: string): void {
  edit(lines, row, (line) => {
    const cells = line.split(delimiter)
    cells[cell % cells.length] = text
    return cells.join(delimiter)
  })
}

function edit(lines: string[], row: number, change: (line: string) => string): void {
  if (lines.length > 0) lines[row % lines.length] = change(lines[row % lines.length])
}

export interface Damage {
  readonly spoilings: readonly Spoiling[]
  readonly mixedLineEnds: boolean
  /** Bytes to overwrite, and where the file is cut; of the whole length, in ten-thousandths. */
  readonly bytes: readonly (readonly [place: number, value: number])[]
  readonly cut: number
}

export const damages: fc.Arbitrary<Damage> = fc.record({
  spoilings: fc.array(spoilings, { maxLength: 5 }),
  mixedLineEnds: fc.boolean(),
  bytes: fc.oneof(
    { weight: 5, arbitrary: fc.constant([]) },
    { weight: 1, arbitrary: fc.array(fc.tuple(at, fc.integer({ min: 0, max: 255 })), { maxLength: 4 }) },
  ),
  cut: fc.oneof({ weight: 8, arbitrary: fc.constant(10_000) }, { weight: 1, arbitrary: at }),
})

export function spoil({ lines: good, headers }: WrittenExport, style: ExportStyle, damage: Damage): Uint8Array {
  const lines = [...good]
  const headerAt = Math.max(0, good.findIndex((line) => headers.every((header) => line.includes(header.replace(/"/g, '""'))))) // prettier-ignore
  for (const spoiling of damage.spoilings) if (lines.length > 0) spoiling(lines, headerAt, style.delimiter)
  const ends = damage.mixedLineEnds ? ['\n', '\r\n', '\r'] : [style.lineEnd]
  const text = lines.map((line, row) => line + ends[row % ends.length]).join('')
  const bytes = encode(text, style.encoding).slice()
  for (const [place, value] of damage.bytes) if (bytes.length > 0) bytes[place % bytes.length] = value
  return bytes.subarray(0, Math.ceil((bytes.length * damage.cut) / 10_000))
}
