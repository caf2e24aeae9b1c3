/** What was read, and how finely: the step of its display, as far as the values betray it. */
import { areExchanged } from './exchanged-columns'
import { medianOf, type HealthInput } from './finding'

/** As near to the meter as the file tells. */
export function readColumn({ readings, vOverIA_ohm, sheetResistance_ohm_sq, value }: HealthInput): Float64Array {
  if (!vOverIA_ohm.some(Number.isFinite)) return sheetResistance_ohm_sq.some(Number.isFinite) ? sheetResistance_ohm_sq : value
  return readings.voltage_V && !areExchanged(readings) ? readings.voltage_V : vOverIA_ohm
} // prettier-ignore

/** A thousand sites of a wafer are enough to tell a display's step. */
export function sampledValues(column: Float64Array, wafers: HealthInput['wafers']): Float64Array {
  return Float64Array.from(wafers.flatMap(({ rows }) => Array.from(rows.subarray(0, 1000), (i) => column[i])))
}

/** The step of the display in parts of the usual reading. */
export function relativeStep(input: HealthInput): number {
  const values = sampledValues(readColumn(input), input.wafers)
  const median = medianOf(values)
  return stepAt(values, median) / Math.abs(median)
}

/**
 * Distance from one of the values to the nearest that differs; 0 where all are the same. The step at a place, and not the
 * smallest of all: values of so many significant digits have finer steps just below a power of ten.
 */
export function stepAt(values: ArrayLike<number>, at: number): number {
  let own = NaN
  for (let i = 0; i < values.length; i++) if (!(Math.abs(values[i] - at) >= Math.abs(own - at))) own = Number.isFinite(values[i]) ? values[i] : own
  let step = Infinity
  for (let i = 0; i < values.length; i++) {
    const gap = Math.abs(values[i] - own)
    // Closer than rounding in double precision tells no step.
    if (gap > 1e-12 * Math.abs(own) && gap < step) step = gap
  }
  return step === Infinity ? 0 : step
} // prettier-ignore
