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
  private readonly mask: number

  constructor(rows: number) {
    let size = 16
    while (size < 2 * rows) size *= 2
    this.slots = new Int32Array(size).fill(EMPTY)
    this.mask = size - 1
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

export function mix(a: number, b: number, c: number): number {
  let hash = Math.imul(a, 0x9e3779b1) ^ Math.imul(b, 0x85ebca6b) ^ Math.imul(c, 0xc2b2ae35)
  hash = Math.imul(hash ^ (hash >>> 15), 0x2c1b3c6d)
  return hash ^ (hash >>> 13)
}

/** The hash cells that a place may share with another within SAME_PLACE_MM: nearly always one. */
export function cellsOf(value: number): readonly number[] {
  const at = value / CELL_MM
  const near = SAME_PLACE_MM / CELL_MM
  const low = Math.round(at - near)
  const high = Math.round(at + near)
  return low === high ? [low] : [low, high]
}
