/** What is wrong with a row that isn't a good reading; asked of bad rows alone, so it may take its time. */
import { LARGEST, OVERLOAD, type ReadingCheck } from './check-reading'
import type { GrowingColumns } from './columns'
import { isStatisticsWord } from './labels'
import type { Layout, NumberCell } from './layout'
import { decimalCode, explainNumber, isBlank, parseNumber, type DecimalMark } from './parse-number'
import { readRole } from './read-role'

/** Why a row as a whole is no reading under this header; null where it has the shape of one. */
export function shapeFault(cells: readonly string[], { width, at }: Layout, filled: number): string | null {
  if ([0, at.site, at.wafer].some((place) => isStatisticsWord(cells[place] ?? ''))) {
    return 'looks like statistics or an end mark, not like a reading'
  }
  if (cells.length >= width && filled <= width) return null
  const count = cells.length < width ? cells.length : filled
  return `has ${count} ${count === 1 ? 'field' : 'fields'} where the header has ${width}`
}

export interface ValueFault {
  readonly header: string
  readonly why: string
  /** The cell at fault; null where it takes the whole row to see. */
  readonly cell: string | null
}

/**
 * What is wrong with the values of a row of the right shape.
 *
 * @param check  of this layout; the row's numbers stand in the columns, in the row after the last
 */
export function valueFault(
  cells: readonly string[],
  layout: Layout,
  decimalMark: DecimalMark,
  check: ReadingCheck,
  columns: GrowingColumns,
): ValueFault {
  const { numbers, headers, at, isLong } = layout
  const faultAt = (place: number, header: string, why: string): ValueFault => ({
    header,
    why,
    cell: cells[place] ?? '',
  })
  const bad = numbers.find((cell) => !isNumberCell(cells, cell, decimalMark))
  if (bad) return faultAt(bad.at, bad.header, explainCell(cells[bad.at], decimalMark))
  const role = isLong ? readRole(cells, at) : 0
  if (role < 0) {
    const isDirection = at.direction >= 0 && readRole(cells, { direction: at.direction, configuration: -1 }) < 0
    const place = isDirection ? at.direction : at.configuration
    return faultAt(place, headers[place], 'is none of A, B, forward, reverse, + and -')
  }
  if (check.isGood(columns.count, role)) {
    const place = at.wafer >= 0 ? at.wafer : at.slot
    return faultAt(place, headers[place] ?? 'wafer', 'is empty: the row names no wafer')
  }
  const { column, why, isCell } = check.explain(columns.count, columns, role)
  const found = numbers.find((cell) => cell.target === column)
  const header = found?.header ?? column
  return isCell ? faultAt(found?.at ?? -1, header, why) : { header, why, cell: null }
}

function isNumberCell(cells: readonly string[], { at, shift }: NumberCell, decimalMark: DecimalMark): boolean {
  const value = parseNumber(cells[at], decimalCode(decimalMark), shift)
  return (value < LARGEST && value > -LARGEST) || isBlank(cells[at])
}

function explainCell(cell: string, decimalMark: DecimalMark): string {
  const value = parseNumber(cell, decimalCode(decimalMark), 0)
  return value === value ? OVERLOAD : explainNumber(cell, decimalMark)
}
