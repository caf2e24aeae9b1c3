/** Tables: columns by share, decimal points in line, the header again on every page. */
import type { TableBlock, TableColumn, TableRow } from '../../../core/report/document'
import { FAINT, INK, QUIET_INK, RULE } from '../../../core/report/figures/ink'
import { mark } from '../../../core/report/figures/marks'
import { drawShapes } from '../draw-shapes'
import { LEADING, SMALL_PT, TEXT_PT } from '../fonts'
import type { Look, Paper } from '../paper'
import type { Place } from './place'
import { baselineOf, linesOf } from './paragraph'

const TITLE: Look = { font: 'bold', size: SMALL_PT, fill: INK }
const UNIT: Look = { font: 'regular', size: SMALL_PT, fill: QUIET_INK }
/** Whatever their face, the cells of a row stand on one line. */
const CELL: Look = { font: 'regular', size: TEXT_PT, fill: INK }
const CELL_GAP_PT = 8
const MARK_PT = 2.8
const AFTER_PT = 8

/** A column's place, and where its decimal points stand. */
interface SetColumn {
  readonly column: TableColumn
  readonly left: number
  readonly width: number
  readonly point: number
}

interface SetRow {
  readonly row: TableRow
  readonly cells: readonly (readonly string[])[]
  readonly height: number
}

export function drawTable(block: TableBlock, paper: Paper, place: Place): void {
  const columns = setColumns(block, paper, place)
  const rows = block.rows.map((row) => setRow(row, columns, paper, block))
  paper.branch('Table', () => {
    drawHeader(columns, paper, place)
    for (const set of rows) {
      if (!paper.fits(set.height)) {
        paper.newPage()
        drawHeader(columns, paper, place)
      }
      drawRow(set, columns, paper, place)
    }
  }, { title: block.summary }) // prettier-ignore
  paper.y += AFTER_PT
}

/** The header and two rows: less would look lost at the foot of a page. */
export function tableStartHeight(block: TableBlock, paper: Paper, width: number): number {
  const columns = setColumns(block, paper, { x: 0, width })
  const rows = block.rows.slice(0, 2).map((row) => setRow(row, columns, paper, block).height)
  return headerHeight(columns, paper) + rows.reduce((sum, height) => sum + height, 0)
}

function setColumns({ columns, rows }: TableBlock, paper: Paper, { x, width }: Place): SetColumn[] {
  const shares = columns.reduce((sum, column) => sum + column.share, 0)
  const room = width - (columns.length - 1) * CELL_GAP_PT
  let left = x
  return columns.map((column, i) => {
    const own = (room * column.share) / shares
    const look = cellLook(column)
    const right = left + own
    const tails = column.align === 'decimal' ? rows.map((row) => paper.measure(tailOf(row.cells[i] ?? ''), look)) : []
    const set = { column, left, width: own, point: right - Math.max(0, ...tails) }
    left = right + CELL_GAP_PT
    return set
  })
}

function setRow(row: TableRow, columns: readonly SetColumn[], paper: Paper, block: TableBlock): SetRow {
  const cells = columns.map(({ column, width }, i) => {
    const text = row.cells[i] ?? ''
    if (column.align === 'decimal') return [text]
    const look = rowLook(column, row)
    return linesOf(text, paper, width - (hasMark(row, i) ? 2 * MARK_PT + 4 : 0), look)
  })
  const lines = Math.max(1, ...cells.map((cell) => cell.length))
  const padding = block.calculation ? 6 : 1.6
  return { row, cells, height: lines * TEXT_PT * LEADING + padding }
}

function headerHeight(columns: readonly SetColumn[], paper: Paper): number {
  return headerLines(columns, paper) * SMALL_PT * LEADING + 5
}

function headerLines(columns: readonly SetColumn[], paper: Paper): number {
  return Math.max(1, ...columns.map((set) => titleLines(set, paper).length + (set.column.unit ? 1 : 0)))
}

function titleLines({ column, width }: SetColumn, paper: Paper): string[] {
  return linesOf(column.title, paper, width + (column.align === 'left' ? 0 : CELL_GAP_PT - 2), TITLE)
}

function drawHeader(columns: readonly SetColumn[], paper: Paper, { x, width }: Place): void {
  const lines = headerLines(columns, paper)
  paper.branch('TR', () => {
    for (const set of columns) {
      const titles = titleLines(set, paper)
      paper.leaf('TH', () => {
        titles.forEach((line, i) => drawHeaderLine(line, i, TITLE, set, paper))
        if (set.column.unit) drawHeaderLine(set.column.unit, titles.length, UNIT, set, paper)
      })
    }
  })
  paper.y += lines * SMALL_PT * LEADING + 3
  paper.rule(x, paper.y, x + width, { colour: INK, width: 0.6 })
  paper.y += 2
}

function drawHeaderLine(line: string, i: number, look: Look, { column, left, width }: SetColumn, paper: Paper): void {
  const baseline = baselineOf(paper.y, i, look)
  if (column.align === 'left') paper.text(line, left, baseline, look)
  else paper.textRight(line, left + width, baseline, look)
}

function drawRow(
  { row, cells, height }: SetRow,
  columns: readonly SetColumn[],
  paper: Paper,
  { x, width }: Place,
): void {
  const isResult = row.emphasis === 'result'
  if (isResult) paper.rule(x, paper.y, x + width, { colour: INK, width: 0.6 })
  const top = paper.y + (height - lineCount(cells) * TEXT_PT * LEADING) / 2
  paper.branch('TR', () => {
    columns.forEach((set, i) => paper.leaf('TD', () => drawCell(cells[i], i, top, set, row, paper)))
  })
  paper.y += height
  paper.rule(x, paper.y, x + width, isResult ? { colour: RULE, width: 0.6 } : { colour: FAINT, width: 0.4 })
}

function lineCount(cells: SetRow['cells']): number {
  return Math.max(1, ...cells.map((cell) => cell.length))
}

function drawCell(lines: readonly string[], i: number, top: number, set: SetColumn, row: TableRow, paper: Paper): void {
  const { column, left, width, point } = set
  const look = rowLook(column, row)
  let start = left
  if (hasMark(row, i)) {
    drawShapes([mark(row.mark!, left + MARK_PT, top + 0.62 * TEXT_PT, MARK_PT)], paper)
    start += 2 * MARK_PT + 4
  }
  lines.forEach((line, at) => {
    const baseline = baselineOf(top, at, CELL)
    if (column.align === 'left') paper.text(line, start, baseline, look)
    else if (column.align === 'right') paper.textRight(line, left + width, baseline, look)
    else paper.text(line, point - paper.measure(headOf(line), look), baseline, look)
  })
}

function hasMark(row: TableRow, cell: number): boolean {
  return row.mark !== undefined && (row.markColumn ?? 0) === cell
}

function cellLook(column: TableColumn): Look {
  return {
    font: column.mono ? 'mono' : 'regular',
    size: column.mono ? SMALL_PT : TEXT_PT,
    fill: column.quiet ? QUIET_INK : INK,
  }
}

/** Bold figures are wider: only what isn't lined up is made bold. */
function rowLook(column: TableColumn, row: TableRow): Look {
  const look = cellLook(column)
  return row.emphasis && column.align !== 'decimal' && !column.mono ? { ...look, font: 'bold' } : look
}

/** What stands left of the decimal point, and the rest with the point. */
function headOf(text: string): string {
  return text.split('.')[0]
}

function tailOf(text: string): string {
  return text.slice(headOf(text).length)
}
