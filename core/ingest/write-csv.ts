import { guardTextCell } from './text-cell'

export interface CsvColumn {
  readonly name: string
  cell(row: number): string | number
}

/**
 * CSV text by RFC 4180 with LF line ends: numbers in the shortest form that reads back to the same double, NaN as an
 * empty cell, text that a spreadsheet would take for a formula guarded by an apostrophe (see text-cell.ts).
 */
export function writeCsv(columns: readonly CsvColumn[], rowCount: number): string {
  const lines = [columns.map((column) => writeText(column.name)).join(',')]
  for (let row = 0; row < rowCount; row++) {
    let line = ''
    for (let at = 0; at < columns.length; at++) {
      const cell = columns[at].cell(row)
      if (at > 0) line += ','
      line += typeof cell === 'number' ? writeNumber(cell) : writeText(cell)
    }
    lines.push(line)
  }
  return lines.join('\n') + '\n'
}

function writeNumber(value: number): string {
  if (value !== value) return ''
  return Object.is(value, -0) ? '-0' : String(value)
}

function writeText(text: string): string {
  const guarded = guardTextCell(text)
  return /[",\r\n]|^\s|\s$/.test(guarded) ? `"${guarded.replace(/"/g, '""')}"` : guarded
}
