/** Site patterns for the tests of maps, without dice. */
import type { Targets } from '../../../core/map/thin-plate-spline'

/** Sites spread evenly over a disc along a spiral of golden angles. */
export function spiral(count: number, radius_mm = 95): Targets {
  const r = (i: number) => radius_mm * Math.sqrt((i + 0.5) / count)
  return {
    x_mm: Float64Array.from({ length: count }, (_, i) => r(i) * Math.cos(2.399963229728653 * i)),
    y_mm: Float64Array.from({ length: count }, (_, i) => r(i) * Math.sin(2.399963229728653 * i)),
  }
}

export function columnOf({ x_mm, y_mm }: Targets, valueAt: (x: number, y: number) => number): Float64Array {
  return Float64Array.from(x_mm, (x, i) => valueAt(x, y_mm[i]!))
}

/** A wafer with a bow, a tilt and a ripple. */
export const bumpy = (x: number, y: number) =>
  92 + 0.02 * x - 0.01 * y + 3e-4 * (x * x + y * y) + Math.sin(x / 17 + y / 23)

export function changed(column: Float64Array, entry: number, value: number): Float64Array {
  return column.map((other, i) => (i === entry ? value : other))
}

export function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  expectSameLength(a, b)
  return Array.from(a, (value, i) => Math.abs(value - b[i]!)).reduce((x, y) => Math.max(x, y), 0)
}

function expectSameLength(a: ArrayLike<number>, b: ArrayLike<number>): void {
  if (a.length !== b.length) throw new Error(`${a.length} against ${b.length}`)
}
