/** One-way analysis of variance: how much of the spread lies between groups, how much within them. */
import { CoreError } from '../problems/problem'
import { gather, preciseMean, sumOf, sumOfSquares } from './mean-and-deviations'

export interface SumOfSquares {
  readonly sumOfSquares: number
  readonly degreesOfFreedom: number
  readonly meanSquare: number
}

export interface AnalysisOfVariance {
  readonly groups: number
  readonly count: number
  readonly between: SumOfSquares
  readonly within: SumOfSquares
  /** Mean square between over mean square within; Infinity where nothing varies within. */
  readonly f: number
  /** Share of the total sum of squares that lies between the groups; NaN where nothing varies at all. */
  readonly rSquared: number
  /** Root of the mean square within. */
  readonly residualStandardDeviation: number
  /** Effective group size of the random-effects model: the common size where all groups are equal. */
  readonly effectiveGroupSize: number
}

/**
 * @param values  finite where they count
 * @param groups  each group's rows of `values`; an empty group is left out
 * @throws CoreError not-applicable for fewer than two groups or no group of two; out-of-range for a NaN that counts
 *
 * Accuracy: sums of squares within a few units of the last place of the exact figures of these doubles.
 * Sources: H. Scheffe, The Analysis of Variance (1959) ch. 3; effective size n0: S. R. Searle, Linear Models (1971)
 * ch. 11 (both from memory).
 */
export function analysisOfVariance(values: Float64Array, groups: readonly Uint32Array[]): AnalysisOfVariance {
  const columns = groups.filter((group) => group.length > 0).map((group) => gather(values, group))
  const count = columns.reduce((sum, column) => sum + column.length, 0)
  requireSpread(columns.length, count)
  const grand = preciseMean(concatenated(columns, count))
  const means = columns.map(preciseMean)
  const within = sumOf(columns.length, (i) => sumOfSquares(columns[i]!, means[i]!))
  const between = sumOf(columns.length, (i) => {
    const deviation = means[i]!.high - grand.high + (means[i]!.low - grand.low)
    return columns[i]!.length * deviation * deviation
  })
  const meanSize = sumOf(columns.length, (i) => columns[i]!.length ** 2) / count
  const betweenGroups = meanSquare(between, columns.length - 1)
  const withinGroups = meanSquare(within, count - columns.length)
  return {
    groups: columns.length,
    count,
    between: betweenGroups,
    within: withinGroups,
    f: betweenGroups.meanSquare / withinGroups.meanSquare,
    rSquared: between / (between + within),
    residualStandardDeviation: Math.sqrt(withinGroups.meanSquare),
    effectiveGroupSize: (count - meanSize) / (columns.length - 1),
  }
}

function meanSquare(sumOfSquares: number, degreesOfFreedom: number): SumOfSquares {
  return { sumOfSquares, degreesOfFreedom, meanSquare: sumOfSquares / degreesOfFreedom }
}

function concatenated(columns: readonly Float64Array[], count: number): Float64Array {
  const all = new Float64Array(count)
  let start = 0
  for (const column of columns) {
    all.set(column, start)
    start += column.length
  }
  return all
}

function requireSpread(groups: number, count: number): void {
  const what = 'analysis of variance'
  if (groups < 2) throw new CoreError({ kind: 'not-applicable', what, why: 'it needs two groups or more' })
  if (count <= groups) throw new CoreError({ kind: 'not-applicable', what, why: 'no group has two values' })
}
