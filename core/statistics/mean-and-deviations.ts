/**
 * Mean and sums of squares to the last bits of double precision, in passes over the values. A textbook one-pass sum
 * of squares keeps two digits of the standard deviation of 1000000.2 +/- 0.1 and none of 10000000.2 +/- 0.1.
 */
import { CoreError } from '../problems/problem'

/** A mean as an unevaluated sum of two doubles: `high` is the mean rounded, `low` what the rounding left. */
export interface PreciseMean {
  readonly high: number
  readonly low: number
}

/** Sum of the terms with the rounding errors carried along (A. Neumaier, ZAMM 54 (1974) 39). */
export function sumOf(count: number, term: (index: number) => number): number {
  let sum = 0
  let lost = 0
  for (let i = 0; i < count; i++) {
    const next = term(i)
    const total = sum + next
    lost += Math.abs(sum) >= Math.abs(next) ? sum - total + next : next - total + sum
    sum = total
  }
  return sum + lost
}

/** Mean of `values`, which must hold at least one, all finite; NaN mean of none. */
export function preciseMean(values: Float64Array): PreciseMean {
  const count = values.length
  const high = sumOf(count, (i) => values[i]!) / count
  return { high, low: sumOf(count, (i) => values[i]! - high) / count }
}

/** Sum of squared deviations from the mean of the same values. */
export function sumOfSquares(values: Float64Array, mean: PreciseMean): number {
  return sumOf(values.length, (i) => {
    const deviation = values[i]! - mean.high - mean.low
    return deviation * deviation
  })
}

/** The chosen values in a new column of their own. Throws CoreError 'out-of-range' for one that isn't finite. */
export function gather(values: Float64Array, indices?: Uint32Array): Float64Array {
  const chosen = indices ? new Float64Array(indices.length) : Float64Array.from(values)
  if (indices) for (let i = 0; i < indices.length; i++) chosen[i] = values[indices[i]!] ?? NaN
  for (let i = 0; i < chosen.length; i++) {
    const value = chosen[i]!
    if (Number.isFinite(value)) continue
    throw new CoreError({ kind: 'out-of-range', quantity: 'value', value, unit: '', min: -Infinity, max: Infinity })
  }
  return chosen
}
