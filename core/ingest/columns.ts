/** The columns while they grow: typed arrays, a number column made only when a file has it. */

import type { NumberColumn } from './column-kinds'

/** Why a row is dropped after reading: its parts stand in another row of the same site, or it is listed as a problem. */
export const DROPPED = { folded: 1, rejected: 2 } as const

export class GrowingColumns {
  count = 0
  wafer = new Uint32Array(0)
  site = new Uint32Array(0)
  file = new Uint16Array(0)
  line = new Uint32Array(0)
  /** The part of a long-form row: bit 0 reverse, bit 1 configuration B. */
  role = new Uint8Array(0)
  readonly numbers = new Map<NumberColumn, Float64Array>()
  private capacity = 0

  /** Makes room for `more` rows. Arrays taken before are stale after it returns true. */
  reserve(more: number): boolean {
    if (this.count + more <= this.capacity) return false
    this.capacity = Math.max(this.count + more, Math.ceil(this.capacity * 1.5), 1024)
    this.wafer = grown(this.wafer, new Uint32Array(this.capacity))
    this.site = grown(this.site, new Uint32Array(this.capacity))
    this.file = grown(this.file, new Uint16Array(this.capacity))
    this.line = grown(this.line, new Uint32Array(this.capacity))
    this.role = grown(this.role, new Uint8Array(this.capacity))
    for (const [name, column] of this.numbers) this.numbers.set(name, grownNumbers(column, this.capacity))
    return true
  }

  /** The column, made and filled with NaN if it isn't there yet. */
  number(name: NumberColumn): Float64Array {
    let column = this.numbers.get(name)
    if (!column) {
      column = new Float64Array(this.capacity).fill(NaN)
      this.numbers.set(name, column)
    }
    return column
  }

  /** A rejected row leaves its numbers behind; a row with fewer columns must not inherit them. */
  clearNext(): void {
    if (this.count < this.capacity) for (const column of this.numbers.values()) column[this.count] = NaN
  }

  truncate(count: number): void {
    for (const column of this.numbers.values()) column.fill(NaN, count, this.count)
    this.role.fill(0, count, this.count)
    this.count = count
  }

  /** Keeps the rows whose `dropped` is 0, in order. */
  compact(dropped: Uint8Array): void {
    const arrays = [this.wafer, this.site, this.file, this.line, this.role, ...this.numbers.values()]
    let kept = 0
    for (let row = 0; row < this.count; row++) {
      if (dropped[row]) continue
      if (kept !== row) for (const array of arrays) array[kept] = array[row]
      kept++
    }
    this.count = kept
  }

  /** The rows there are; null where no row has a number. */
  finished(name: NumberColumn): Float64Array | null {
    const column = this.numbers.get(name)
    if (!column) return null
    for (let row = 0; row < this.count; row++) if (column[row] === column[row]) return this.trimmed(column)
    return null
  }

  /** Without a copy where little room is left over: a million rows of a dozen columns are not held twice. */
  trimmed<T extends Float64Array | Uint32Array | Uint16Array>(column: T): T {
    const wasted = column.length - this.count
    return (wasted > column.length / 8 ? column.slice(0, this.count) : column.subarray(0, this.count)) as T
  }
}

function grown<T extends Uint32Array | Uint16Array | Uint8Array>(old: T, larger: T): T {
  larger.set(old)
  return larger
}

function grownNumbers(old: Float64Array, capacity: number): Float64Array {
  const larger = new Float64Array(capacity)
  larger.set(old)
  return larger.fill(NaN, old.length)
}
