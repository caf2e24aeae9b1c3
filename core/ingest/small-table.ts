/** What the small tables beside the readings have in common: depth profiles, gauge studies, check wafers. */
import { isBlank, type DecimalMark } from './parse-number'
import type { Rows } from './split-rows'

export const TABLE_DELIMITERS = [',', ';', '\t'] as const
/** A header stands no lower. */
export const SEARCHED_ROWS = 200
/** More of them are of one cause. */
export const MAX_TABLE_PROBLEMS = 20

export interface RowFault {
  readonly line: number
  readonly why: string
}

/** Blank lines, and comments: those that begin with # or %. */
export function isPassedOver(cells: readonly string[]): boolean {
  return cells.every(isBlank) || /^\s*[#%]/.test(cells[0])
}

/** Between commas a decimal mark is a point; otherwise the one that more cells have. */
export function decimalMarkOf({ cells }: Rows, headerRow: number, delimiter: string): DecimalMark {
  if (delimiter === ',') return '.'
  const numbers = cells.slice(headerRow + 1).flat()
  const having = (mark: RegExp): number => numbers.filter((cell) => mark.test(cell)).length
  return having(/^\s*-?\d*,\d/) > having(/^\s*-?\d*\.\d/) ? ',' : '.'
}
