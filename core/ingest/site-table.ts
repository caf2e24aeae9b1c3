/**
 * Finds the row that holds a site already, by name or by place, without an object a row: two open-addressed hash tables
 * of row numbers.
 */
const EMPTY = -1
/** Places nearer than this are one site. */
export const SAME_PLACE_MM = 1e-6
/** Side of a hash cell; sites stand on such a grid, well inside their cell. */
const CELL_MM = 1e-3

export class RowTable {
  private readonly slots: Int32Array
  private mask = 0

  constructor(mostRows: number) {
    this.slots = new Int32Array(sizeFor(mostRows))
  }

  /** Empties it, and makes it no larger than so many rows need: a small table stays in the processor's cache. */
  clearFor(rows: number): void {
    const size = sizeFor(rows)
    this.mask = size - 1
    this.slots.fill(EMPTY, 0, size)
  }

  /** The first row under this hash for which `isSame` holds, or -1. */
  find(hash: number, isSame: (row: number) => boolean): number {
    for (let slot = hash & this.mask; this.slots[slot] !== EMPTY; slot = (slot + 1) & this.mask) {
      if (isSame(this.slots[slot])) return this.slots[slot]
    }
    return EMPTY
  }

  insert(hash: number, row: number): void {
    let slot = hash & this.mask
    while (this.slots[slot] !== EMPTY) slot = (slot + 1) & this.mask
    this.slots[slot] = row
  }
}

function sizeFor(rows: number): number {
  let size = 16
  while (size < 2 * rows) size *= 2
  return size
}

export function mix(a: number, b: number): number {
  let hash = Math.imul(a, 0x85ebca6b) ^ Math.imul(b, 0xc2b2ae35)
  hash = Math.imul(hash ^ (hash >>> 15), 0x2c1b3c6d)
  return hash ^ (hash >>> 13)
}

/** A place may share two hash cells with another within SAME_PLACE_MM; nearly always they are one. */
export const lowCellOf = (value_mm: number): number => Math.round(value_mm / CELL_MM - SAME_PLACE_MM / CELL_MM)
export const highCellOf = (value_mm: number): number => Math.round(value_mm / CELL_MM + SAME_PLACE_MM / CELL_MM)
export const cellOf = (value_mm: number): number => Math.round(value_mm / CELL_MM)
