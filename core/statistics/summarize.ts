/** The figures by which a wafer or a lot is known: where its values lie and how far they spread. */
import { gather, preciseMean, sumOfSquares } from './mean-and-deviations'
import { nonuniformities, type NonuniformityId } from './nonuniformity'
import { quantileInPlace } from './quantiles'

export interface Statistics {
  readonly count: number
  readonly mean: number
  /** The mean of the middle two of an even count. */
  readonly median: number
  /** Sample standard deviation, divisor n-1; NaN for one site. */
  readonly standardDeviation: number
  readonly min: number
  readonly max: number
  readonly range: number
  /** Every non-uniformity in use, each with its formula; see nonuniformity.ts. */
  readonly nonuniformity: readonly {
    readonly id: NonuniformityId
    readonly formula: string
    readonly percent: number
  }[]
  /** SEMI MF1618 SUP, 100 s / mean. */
  readonly nonuniformityPercent: number
  /** SEMI MF1618 HLV, 200 (max - min) / (max + min). */
  readonly rangePercent: number
}

/**
 * Statistics of the values, or of those that `indices` names: whoever asks says which sites count.
 *
 * @param values   finite where they count, any one unit
 * @param indices  rows of `values`; absent: all
 * @returns count 0 gives NaN throughout, count 1 a NaN standard deviation
 * @throws CoreError out-of-range for a value that counts and is NaN or infinite
 *
 * Accuracy: mean and standard deviation within a unit or two of the last place of the exact figures of these doubles.
 * Sources: non-uniformity SEMI MF1618-1104.
 */
export function summarize(values: Float64Array, indices?: Uint32Array): Statistics {
  const chosen = gather(values, indices)
  const count = chosen.length
  const { min, max } = extremes(chosen)
  const precise = preciseMean(chosen)
  const mean = precise.high + precise.low
  const standardDeviation = count > 1 ? Math.sqrt(sumOfSquares(chosen, precise) / (count - 1)) : NaN
  const median = count > 0 ? quantileInPlace(chosen, 0.5) : NaN
  const spread = { mean, standardDeviation, min, max }
  const nonuniformity = nonuniformities.map(({ id, formula, percent }) => ({ id, formula, percent: percent(spread) }))
  const percentOf = (id: NonuniformityId) => nonuniformity.find((entry) => entry.id === id)!.percent
  return {
    count,
    mean,
    median,
    standardDeviation,
    min,
    max,
    range: max - min,
    nonuniformity,
    nonuniformityPercent: percentOf('sup'),
    rangePercent: percentOf('hlv'),
  }
}

function extremes(values: Float64Array): { min: number; max: number } {
  let min = values[0] ?? NaN
  let max = min
  for (const value of values) {
    if (value < min) min = value
    if (value > max) max = value
  }
  return { min, max }
}
