/** Whether the numbers of one row make a reading. Quick for the many good rows; what is wrong is found by `explain`. */
import type { GrowingColumns } from './columns'
import type { NumberColumn } from './column-kinds'
import type { Layout } from './layout'
import { REVERSE_BIT } from './read-role'

/** Meters answer 9.9E37 for an overload (SCPI 1999, volume 1, 7.2.1; from memory); no quantity we read comes near this. */
export const LARGEST = 1e30
export const OVERLOAD = 'is too large: an overload mark of the meter'
/** Nor does any come near this from the other side: what is smaller is no reading, and V/I of it would leave all bounds. */
export const SMALLEST = 1e-30
/** A kilometre, and as many dies: no wafer is so wide. */
const FARTHEST = 1e6

export class ReadingCheck {
  private readonly x: Float64Array | null
  private readonly y: Float64Array | null
  private readonly dies: readonly Float64Array[]
  private readonly current: Float64Array | null
  private readonly voltage: Float64Array | null
  private readonly vOverI: Float64Array | null
  private readonly ready: readonly Float64Array[]
  private readonly pairs: readonly (readonly [Float64Array, Float64Array])[]

  constructor(
    columns: GrowingColumns,
    private readonly layout: Layout,
  ) {
    const column = (name: NumberColumn) => (has(layout, name) ? columns.number(name) : null)
    this.x = column('x_mm')
    this.y = column('y_mm')
    this.dies = DIES.flatMap((name) => column(name) ?? [])
    this.current = column('current_A')
    this.voltage = column('voltage_V')
    this.vOverI = column('vOverI_ohm')
    this.ready = READY.flatMap((name) => column(name) ?? [])
    this.pairs = SIDE_PAIRS.flatMap(([i, v]) => {
      const current = column(i)
      const voltage = column(v)
      return current && voltage ? [[current, voltage] as const] : []
    })
  }

  /** `role`: of a row in a long file; the sign of a reverse reading is judged later, with the others. */
  isGood(row: number, role: number): boolean {
    const isReverse = (role & REVERSE_BIT) !== 0
    const { x, y, current, voltage } = this
    if (x !== null && y !== null && !(Math.abs(x[row]) <= FARTHEST && Math.abs(y[row]) <= FARTHEST)) return false
    for (const die of this.dies) if (die[row] === die[row] && !isDieIndex(die[row])) return false
    let found = false
    if (current !== null && voltage !== null) {
      const i = current[row]
      const v = voltage[row]
      if (i === i || v === v) {
        if (!(isReverse ? isReading(i) && isReading(v) : areReadingsOfOneSign(i, v))) return false
        found = true
      }
    }
    if (role !== 0 && !found && !this.hasPlaceFor(row, isReverse)) return false
    for (const column of this.ready) {
      const value = column[row]
      if (value < SMALLEST) return false
      if (value === value) found = true
    }
    for (const [i, v] of this.pairs) {
      if (v[row] === v[row] && !(isReading(i[row]) && isReading(v[row]))) return false
    }
    return found
  }

  /** A value ready made: `Readings` has a place for a V/I of configuration B, and none for the reverse direction. */
  private hasPlaceFor(row: number, isReverse: boolean): boolean {
    return !isReverse && this.vOverI !== null && this.vOverI[row] === this.vOverI[row]
  }

  /** The column at fault and why, for a row that isn't good. */
  explain(
    row: number,
    columns: GrowingColumns,
    role: number,
  ): { readonly column: NumberColumn; readonly why: string; readonly isCell: boolean } {
    const value = (name: NumberColumn) => (has(this.layout, name) ? columns.number(name)[row] : NaN)
    const cell = (column: NumberColumn, why: string) => ({ column, why, isCell: true })
    if (this.x && Number.isNaN(value('x_mm'))) return cell('x_mm', 'is empty')
    if (this.y && Number.isNaN(value('y_mm'))) return cell('y_mm', 'is empty')
    for (const name of PLACES) if (Math.abs(value(name)) > FARTHEST) return cell(name, 'is no place on a wafer')
    for (const name of DIES) {
      if (!Number.isNaN(value(name)) && !isDieIndex(value(name))) return cell(name, 'is no index of a die')
    }
    for (const [i, v] of [['current_A', 'voltage_V'], ...SIDE_PAIRS] as const) {
      if (!has(this.layout, i) || !has(this.layout, v)) continue
      const isFirst = i === 'current_A'
      const isGiven = !Number.isNaN(value(v)) || (isFirst && (!Number.isNaN(value(i)) || this.ready.length === 0))
      if (!isGiven) continue
      for (const name of [i, v]) {
        if (Number.isNaN(value(name))) return cell(name, 'is empty')
        if (value(name) === 0)
          return cell(name, name === i ? 'is zero: no current, no reading' : 'is zero: V/I would be zero')
        if (!isReading(value(name))) return cell(name, TOO_SMALL)
      }
      if (isFirst && (role & REVERSE_BIT) === 0 && value(i) * value(v) < 0) {
        const why = `voltage and current have opposite signs (${value(v)} V, ${value(i)} A): V/I would be negative`
        return { column: v, why, isCell: false }
      }
    }
    if (role !== 0 && Number.isNaN(value('voltage_V')) && !this.hasPlaceFor(row, (role & REVERSE_BIT) !== 0)) {
      const why = 'a reverse or configuration B row needs its voltage and current'
      return { column: 'voltage_V', why, isCell: false }
    }
    for (const name of READY) {
      if (value(name) <= 0) return cell(name, 'is not above zero')
      if (value(name) < SMALLEST) return cell(name, TOO_SMALL)
    }
    return { column: READY.find((name) => has(this.layout, name)) ?? 'voltage_V', why: 'is empty', isCell: true }
  }
}

const PLACES = ['x_mm', 'y_mm'] as const
const DIES = ['dieX', 'dieY'] as const

function isDieIndex(value: number): boolean {
  return Number.isInteger(value) && Math.abs(value) <= FARTHEST
}

const TOO_SMALL = 'is too near to zero to be a reading'

/** Not zero, not empty. */
function isReading(value: number): boolean {
  return value >= SMALLEST || value <= -SMALLEST
}

function areReadingsOfOneSign(i: number, v: number): boolean {
  return (i >= SMALLEST && v >= SMALLEST) || (i <= -SMALLEST && v <= -SMALLEST)
}

const READY = ['vOverI_ohm', 'vOverIB_ohm', 'sheetResistance_ohm_sq', 'resistivity_ohm_cm'] as const
const SIDE_PAIRS = [
  ['currentReverse_A', 'voltageReverse_V'],
  ['currentB_A', 'voltageB_V'],
  ['currentReverseB_A', 'voltageReverseB_V'],
] as const

function has(layout: Layout, name: NumberColumn): boolean {
  return layout.numbers.some((cell) => cell.target === name)
}
