/** A header row as the row reader needs it: which place of a row goes to which column, with which unit. */
import type { FileProblem } from '../problems/problem'
import { NUMBER_KINDS } from './column-kinds'
import type { NumberColumn } from './column-kinds'
import { matchColumns } from './match-columns'
import type { MatchedColumn } from './match-columns'
import { trimmed, widthOf } from './find-header'
import type { HeaderTarget } from './header-words'
import type { ReadOptions } from './read-options'
import type { ColumnId, ColumnMatch } from './readings'

export interface NumberCell {
  readonly at: number
  readonly header: string
  readonly target: NumberColumn
  /** Decimal places to move, where the unit is a power of ten. */
  readonly shift: number
  /** Applied after, where it is not; 1 and 0 otherwise. */
  readonly scale: number
  readonly offset: number
}

export interface Layout {
  /** Cells of a row. */
  readonly width: number
  readonly headers: readonly string[]
  readonly numbers: readonly NumberCell[]
  /** Places of text cells, -1 where there is none. */
  readonly at: { readonly [target in (typeof TEXT_TARGETS)[number]]: number }
  readonly isPolar: boolean
  readonly isLong: boolean
  readonly columns: readonly MatchedColumn[]
  readonly matches: readonly ColumnMatch[]
  readonly ignoredHeaders: readonly string[]
}

const TEXT_TARGETS = ['lot', 'wafer', 'slot', 'site', 'time', 'date', 'configuration', 'direction'] as const

export function makeLayout(file: string, cells: readonly string[], options: ReadOptions): Layout | FileProblem {
  const headers = trimmed(cells).slice(0, widthOf(cells))
  const { columns, problem } = matchColumns(file, headers, options)
  if (problem) return problem
  const place = (target: HeaderTarget) => columns.find((column) => column.target === target)?.at ?? -1
  const at = Object.fromEntries(TEXT_TARGETS.map((target) => [target, place(target)])) as Layout['at']
  return {
    width: headers.length,
    headers,
    numbers: columns.flatMap(numberCell),
    at,
    isPolar: place('r_mm') >= 0,
    isLong: at.configuration >= 0 || at.direction >= 0,
    columns,
    matches: columns.flatMap(columnMatch),
    ignoredHeaders: headers.filter((header, index) => header !== '' && !columns.some((column) => column.at === index)),
  }
}

function numberCell({ target, at, header, unit }: MatchedColumn): NumberCell[] {
  const kind = NUMBER_KINDS[target as ColumnId]
  if (!kind) return []
  const isDecimal = unit === null || unit.power10 !== null
  const shift = unit?.power10 ?? 0
  return [
    { at, header, target: kind.target, shift, scale: isDecimal ? 1 : unit.scale, offset: isDecimal ? 0 : unit.offset },
  ]
}

/** Configuration and direction are no columns of ours: what they do is said in a note. */
function columnMatch({ target, at, header, unit, why }: MatchedColumn): ColumnMatch[] {
  if (target === 'configuration' || target === 'direction') return []
  if (target === 'date') return [{ header, position: at + 1, column: 'time', unit: '', why: 'the day of the time' }]
  return [{ header, position: at + 1, column: target, unit: unit?.id ?? '', why }]
}
