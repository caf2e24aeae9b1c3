import type { KeyValue, KeyValuesBlock } from '../../../core/report/document'
import { INK, QUIET_INK } from '../../../core/report/figures/ink'
import { LEADING, SMALL_PT, TEXT_PT } from '../fonts'
import type { Look, Paper } from '../paper'
import type { Place } from './place'
import { baselineOf, linesOf } from './paragraph'

const KEY: Look = { font: 'regular', size: TEXT_PT, fill: QUIET_INK }
const VALUE: Look = { font: 'regular', size: TEXT_PT, fill: INK }
const NOTE: Look = { font: 'regular', size: SMALL_PT, fill: QUIET_INK }
const COLUMN_GAP_PT = 18
const AFTER_PT = 4
const ROW_PT = TEXT_PT * LEADING + 0.6

/** A pair's lines as they will stand, and whether the note follows on the last of them or below. */
interface Pair {
  readonly key: string
  readonly lines: readonly string[]
  readonly note: string
  readonly noteBelow: boolean
}

interface Setting {
  readonly rows: readonly (readonly Pair[])[]
  readonly columnWidth: number
  /** Of the value, from the start of its column; one a column. */
  readonly valueAt: readonly number[]
}

export function keyValuesHeight(block: KeyValuesBlock, paper: Paper, width: number): number {
  return setting(block, paper, width).rows.reduce((sum, row) => sum + rowHeight(row), AFTER_PT)
}

export function drawKeyValues(block: KeyValuesBlock, paper: Paper, { x, width }: Place): void {
  const { rows, columnWidth, valueAt } = setting(block, paper, width)
  paper.branch('Div', () => {
    for (const row of rows) {
      paper.ensure(rowHeight(row))
      row.forEach((pair, i) => drawPair(pair, paper, x + i * (columnWidth + COLUMN_GAP_PT), valueAt[i]))
      paper.y += rowHeight(row)
    }
  })
  paper.y += AFTER_PT
}

function drawPair(pair: Pair, paper: Paper, x: number, valueAt: number): void {
  paper.leaf('P', () => {
    paper.text(pair.key, x, baselineOf(paper.y, 0, KEY), KEY)
    pair.lines.forEach((line, i) => paper.text(line, x + valueAt, baselineOf(paper.y, i, VALUE), VALUE))
    if (pair.note === '') return
    const last = pair.lines.length - 1
    const beside = paper.measure(pair.lines[last], VALUE) + 7
    if (pair.noteBelow) paper.text(pair.note, x + valueAt, baselineOf(paper.y, last + 1, VALUE), NOTE)
    else paper.text(pair.note, x + valueAt + beside, baselineOf(paper.y, last, VALUE), NOTE)
  })
}

function setting({ columns, entries }: KeyValuesBlock, paper: Paper, width: number): Setting {
  const columnWidth = (width - (columns - 1) * COLUMN_GAP_PT) / columns
  const valueAt = Array.from({ length: columns }, (_, column) => {
    const keys = entries.filter((_, i) => i % columns === column).map(({ key }) => paper.measure(key, KEY))
    return Math.min(0.5 * columnWidth, Math.max(0, ...keys) + 10)
  })
  const rows: Pair[][] = []
  entries.forEach((entry, i) => {
    if (i % columns === 0) rows.push([])
    rows[rows.length - 1].push(pairOf(entry, paper, columnWidth - valueAt[i % columns]))
  })
  return { rows, columnWidth, valueAt }
}

function pairOf({ key, value, note = '' }: KeyValue, paper: Paper, width: number): Pair {
  const lines = linesOf(value, paper, width, VALUE)
  const beside = paper.measure(lines[lines.length - 1], VALUE) + 7 + paper.measure(note, NOTE)
  return { key, lines, note, noteBelow: note !== '' && beside > width }
}

function rowHeight(row: readonly Pair[]): number {
  const lines = row.map((pair) => pair.lines.length + (pair.noteBelow ? 1 : 0))
  return ROW_PT + (Math.max(1, ...lines) - 1) * TEXT_PT * LEADING
}
