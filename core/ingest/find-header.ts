/** The delimiter and the header row, found together: the delimiter is the one under which a row reads as a header. */
import type { FileProblem } from '../problems/problem'
import { findUnit } from '../units/unit-register'
import { headerStrength } from './match-columns'
import { isBlank, parseNumber } from './parse-number'
import type { ReadOptions } from './read-options'
import { splitRows } from './split-rows'
import type { Rows } from './split-rows'

export interface FoundHeader {
  readonly delimiter: string
  /** Index into the rows of the first block. */
  readonly row: number
}

const DELIMITERS = [',', ';', '\t'] as const
/** A preamble may be long, but not longer. */
const SEARCH_ROWS = 500
const MAX_COLUMNS = 1000

export function findHeader(file: string, block: string, options: ReadOptions): FoundHeader | FileProblem {
  const declared = /^\s*sep=([,;\t])[^\S\n]*(?:\n|$)/i.exec(block)?.[1]
  const delimiters = options.delimiter ? [options.delimiter] : declared ? [declared] : DELIMITERS
  let best: (FoundHeader & { readonly rank: number }) | null = null
  for (const delimiter of delimiters) {
    const found = searchRows(splitRows(block, delimiter, 1), options)
    if (found && (best === null || found.rank > best.rank)) best = { delimiter, ...found }
  }
  if (best) return { delimiter: best.delimiter, row: best.row }
  const firstLine = block.split(/\r?\n/, 50).find((line) => !isBlank(line)) ?? ''
  return { kind: 'no-header', file, firstLine: firstLine.slice(0, 120).trim() }
}

/** The first row that names our columns and is followed by numbers; else one that names them; else words over numbers. */
function searchRows(rows: Rows, options: ReadOptions): { row: number; rank: number } | null {
  let named: { row: number; rank: number } | null = null
  let unnamed: { row: number; rank: number } | null = null
  const end = Math.min(rows.cells.length, SEARCH_ROWS)
  for (let row = 0; row < end; row++) {
    const cells = rows.cells[row]
    if (!isWordRow(cells) || isUnsplit(cells)) continue
    const strength = headerStrength(trimmed(cells), options)
    const next = nextFilled(rows, row)
    const isOverNumbers = next !== null && countNumbers(next) > 0 && next.length >= widthOf(cells)
    if (strength > 0 && isOverNumbers) return { row, rank: 2000 + strength }
    if (strength > 1) named ??= { row, rank: 1000 + strength }
    const isTable = isOverNumbers && widthOf(cells) > 1 && countNumbers(next) * 2 >= widthOf(cells)
    if (isTable && widthOf(cells) > (unnamed?.rank ?? 0)) unnamed = { row, rank: widthOf(cells) }
  }
  return named ?? unnamed
}

/** One cell with another delimiter in it: the row is not split as it should be, and "1,92" under it is no 1.92. */
function isUnsplit(cells: readonly string[]): boolean {
  return widthOf(cells) === 1 && /[,;\t]/.test(cells[0].trim())
}

export function trimmed(cells: readonly string[]): string[] {
  return cells.map((cell) => cell.trim())
}

/** Words, no numbers: what a header row looks like. */
export function isWordRow(cells: readonly string[]): boolean {
  return cells.length <= MAX_COLUMNS && !cells.every(isBlank) && countNumbers(cells) === 0
}

/** Units under the names: every filled cell is a unit, perhaps in brackets. */
export function isUnitsRow(cells: readonly string[]): boolean {
  const filled = cells.filter((cell) => !isBlank(cell))
  return (
    filled.length > 0 &&
    filled.every((cell) => /^[([]?-*[)\]]?$/.test(cell.trim()) || findUnit(cell.replace(/[()[\]]/g, '')) !== null)
  )
}

/** Without the empty cells at the end. */
export function widthOf(cells: readonly string[]): number {
  let width = cells.length
  while (width > 0 && isBlank(cells[width - 1])) width--
  return width
}

function nextFilled(rows: Rows, row: number): readonly string[] | null {
  for (let next = row + 1; next < Math.min(rows.cells.length, row + 10); next++) {
    const cells = rows.cells[next]
    if (!cells.every(isBlank) && !isUnitsRow(cells)) return cells
  }
  return null
}

function countNumbers(cells: readonly string[]): number {
  let count = 0
  for (const cell of cells) if (isNumber(cell)) count++
  return count
}

function isNumber(cell: string): boolean {
  return !Number.isNaN(parseNumber(cell, 46, 0)) || !Number.isNaN(parseNumber(cell, 44, 0))
}
