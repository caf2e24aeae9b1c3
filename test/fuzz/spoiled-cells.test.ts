/**
 * Single cells gone wrong in files otherwise good: the row is refused and listed, or its cell is a number by the letter of
 * the rule and the result is that number's. All other rows stay as they were.
 */
import fc from 'fast-check'
import { describe, it } from 'vitest'
import { run } from '../../core/analysis/run'
import { exportStyles, type ExportStyle } from './export-style'
import { fuzz, PATIENCE_MS } from './fuzz-runs'
import { measuredLots, valueOf, type MeasuredLot } from './measured-lots'
import { require } from './sound-result'
import { TRAP_CELLS } from './spoil-export'
import { encode } from './write-cells'
import { readyMade, writeExport } from './write-export'

interface Case {
  readonly lot: MeasuredLot
  readonly style: ExportStyle
  readonly traps: readonly (readonly [row: number, isCurrent: boolean, cell: string])[]
}

const trap = fc.oneof(
  { weight: 2, arbitrary: fc.constantFrom<string>(...TRAP_CELLS) },
  { weight: 1, arbitrary: fc.stringMatching(/^[-+ ]?[0-9.,eE+' ]{0,9}$/) },
  { weight: 1, arbitrary: fc.double().map(String) },
)
const cases: fc.Arbitrary<Case> = fc
  .record({
    lot: measuredLots,
    style: exportStyles,
    form: fc.constantFrom('single' as const, 'ratio' as const, 'reported' as const),
    traps: fc.array(fc.tuple(fc.nat(), fc.boolean(), trap), { minLength: 1, maxLength: 4 }),
  })
  .map(({ lot, style, form, traps }) => ({
    lot,
    traps,
    style: { ...style, form, decoys: [], wafers: 'column', footer: 'none', padded: false, signs: 'magnitudes' },
  }))

/** The double that the cell means, in the unit it is written in times 10^power; null where it is no number. */
function strictNumber(cell: string, mark: '.' | ',', power: number): number | null {
  const text = cell.replace(/^[ \t\r\n\u00a0\uFEFF]+|[ \t\r\n\u00a0\uFEFF]+$/g, '')
  const digits =
    mark === '.'
      ? /^([+\-\u2212]?)(\d+\.?\d*|\.\d+)(?:[eE]([+\-\u2212]?\d{1,4}))?$/
      : /^([+\-\u2212]?)(\d+,?\d*|,\d+)(?:[eE]([+\-\u2212]?\d{1,4}))?$/
  const match = digits.exec(text)
  if (!match) return null
  const exponent = Number((match[3] ?? '0').replace('\u2212', '-')) + power
  const value = Number(`${match[2].replace(',', '.')}e${exponent}`)
  return match[1] === '-' || match[1] === '\u2212' ? -value : value
}

function isReading(value: number): boolean {
  return Math.abs(value) >= 1e-30 && Math.abs(value) < 1e30
}

function check({ lot, style, traps }: Case): void {
  const written = writeExport(lot, style)
  const lines = [...written.lines]
  const cellsOf = (line: string) => splitQuoted(line, style.delimiter)
  const headers = written.headers
  const places = headers.flatMap((header, at) =>
    /^(I\b|I14|Current|Source)/.test(header)
      ? [{ at, isCurrent: true }]
      : /^(V|U|Volt|Measured v|Rs|Sheet|Rsheet)/.test(header)
        ? [{ at, isCurrent: false }]
        : [],
  )
  const spoiled = new Map<number, { readonly isCurrent: boolean; readonly cell: string }>()
  const most = Math.floor(written.rows.length / 3)
  for (const [row, wantsCurrent, cell] of traps.slice(0, most)) {
    const { line, site } = written.rows[row % written.rows.length]
    const place = places.find(({ isCurrent }) => isCurrent === wantsCurrent) ?? places[0]
    if (spoiled.has(site)) continue
    const cells = cellsOf(lines[line])
    cells[place.at] = cell
    lines[line] = cells.map((text) => quoted(text, style.delimiter)).join(style.delimiter)
    spoiled.set(site, { isCurrent: place.isCurrent, cell })
  }
  const bytes = encode(lines.join(style.lineEnd) + style.lineEnd, style.encoding)
  const { analysis, problems } = run({
    readings: [{ name: 'TB-0417.csv', bytes, sha256: '00' }],
    procedure: {
      name: 'p.json',
      bytes: new TextEncoder().encode(
        JSON.stringify({
          format: 'persquare-procedure/1',
          readings: { decimalMark: style.decimalMark, delimiter: style.delimiter },
        }),
      ),
    },
  })
  // Control characters make a small file look like no text at all.
  if (analysis === null && problems.every(({ kind }) => kind === 'not-text')) return
  require(analysis !== null, () => `refused: ${JSON.stringify(problems)}`)
  const { readings, sites } = analysis!
  const rowOf = new Map([...readings.line].map((line, row) => [line, row]))
  const listed = new Set(problems.flatMap((problem) => ('line' in problem ? [problem.line] : [])))
  for (const { line, site } of written.rows) {
    const expected = expectedSheetResistance(written.sites[site], style, spoiled.get(site))
    const row = rowOf.get(line + 1)
    const cell = JSON.stringify(spoiled.get(site)?.cell)
    if (expected === null) {
      require(row === undefined && listed.has(line + 1), () =>
        `${cell} taken for ${row === undefined ? 'nothing, in silence' : sites.sheetResistance_ohm_sq[row]}`)
    } else {
      require(row !== undefined, () => `line ${line + 1} lost: ${cell}; ${JSON.stringify(problems)}`)
      const found = sites.sheetResistance_ohm_sq[row!]
      require(Math.abs(found - expected) <= 1e-12 * expected, () => `${found} for ${expected}: ${cell}`)
    }
  }
  require(readings.count + (problems.length - problems.filter((problem) => !('line' in problem)).length) >=
    written.rows.length, () => 'a row is neither read nor listed')
}

/** null where the row must be refused. */
function expectedSheetResistance(
  { a }: MeasuredLot['sites'][number],
  style: ExportStyle,
  spoiled: { readonly isCurrent: boolean; readonly cell: string } | undefined,
): number | null {
  const power = (unit: readonly [string, number]) => (style.headerStyle === 'base' ? 0 : unit[1])
  const written = (unit: readonly [string, number]) =>
    spoiled && strictNumber(spoiled.cell, style.decimalMark, power(unit))
  if (style.form !== 'single') {
    const value = spoiled
      ? written(style.form === 'ratio' ? style.units.resistance : style.units.sheet)!
      : valueOf(readyMade(a))
    if (value === null || !isReading(value) || value < 0) return null
    return style.form === 'ratio' ? (value * Math.PI) / Math.LN2 : value
  }
  const current = spoiled?.isCurrent ? written(style.units.current)! : valueOf(a.current)
  const voltage = spoiled && !spoiled.isCurrent ? written(style.units.voltage)! : valueOf(a.voltage)
  if (current === null || voltage === null || !isReading(current) || !isReading(voltage)) return null
  return current * voltage > 0 ? ((voltage / current) * Math.PI) / Math.LN2 : null
}

function splitQuoted(line: string, delimiter: string): string[] {
  const cells: string[] = []
  let cell = ''
  let isOpen = false
  for (let at = 0; at < line.length; at++) {
    if (line[at] === '"' && isOpen && line[at + 1] === '"') cell += line[++at]
    else if (line[at] === '"') isOpen = !isOpen
    else if (line[at] === delimiter && !isOpen) {
      cells.push(cell)
      cell = ''
    } else cell += line[at]
  }
  return [...cells, cell]
}

function quoted(cell: string, delimiter: string): string {
  return /["\r\n]/.test(cell) || cell.includes(delimiter) ? `"${cell.replace(/"/g, '""')}"` : cell
}

describe('a cell gone wrong', () => {
  it(
    'is refused and listed, or is the number it says',
    () => {
      fuzz('spoiled cells', 12, cases, check)
    },
    PATIENCE_MS,
  )
})
