/** The decimal mark of a file, from the number cells of its first rows. */
import type { DecimalMark } from './parse-number'
import { NUMBER_KINDS } from './column-kinds'
import type { MatchedColumn } from './match-columns'
import type { ColumnId } from './readings'

const SAMPLE_ROWS = 200
const WITH_POINT = /^\s*[+-]?\d*\.\d+(e[+-]?\d+)?\s*$/i
const WITH_COMMA = /^\s*[+-]?\d*,\d+(e[+-]?\d+)?\s*$/i

/** A majority decides and what disagrees with it is refused later, cell by cell; a tie is for the point. */
export function guessDecimalMark(rows: readonly (readonly string[])[], columns: readonly MatchedColumn[]): DecimalMark {
  const places = columns.filter(({ target }) => NUMBER_KINDS[target as ColumnId] !== undefined).map(({ at }) => at)
  let points = 0
  let commas = 0
  for (const cells of rows.slice(0, SAMPLE_ROWS)) {
    for (const at of places) {
      const cell = cells[at] ?? ''
      if (WITH_POINT.test(cell)) points++
      else if (WITH_COMMA.test(cell)) commas++
    }
  }
  return commas > points ? ',' : '.'
}
